// node --import ./.scripts/run-source.mjs src/main.ts
import { register } from 'node:module';

register('./typescript-hooks.mjs', import.meta.url);
