// Lets Node 20 run the TypeScript sources as they stand, for tests that need a process of their own:
// what is killed or driven by a browser is then the code under test, not the last build. Each file is
// translated once and kept by the hash of its text.
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const root = new URL('../', import.meta.url);
const cache = new URL('node_modules/.cache/stillair-sources/', root);
const tsconfig = readFileSync(new URL('tsconfig.json', root), 'utf8');
mkdirSync(cache, { recursive: true });

async function translated(file, text) {
  const { default: ts } = await import('typescript');
  const { options } = ts.convertCompilerOptionsFromJson(
    {
      ...JSON.parse(tsconfig).compilerOptions,
      noEmit: false,
      module: 'esnext',
      moduleResolution: 'bundler',
      inlineSourceMap: true,
    },
    fileURLToPath(root),
  );
  return ts.transpileModule(text, { fileName: file, compilerOptions: options }).outputText;
}

export async function resolve(specifier, context, next) {
  if (/^\.{1,2}\/.*\.js$/.test(specifier) && context.parentURL?.match(/\.tsx?$/)) {
    for (const ending of ['.ts', '.tsx']) {
      const url = new URL(specifier.replace(/\.js$/, ending), context.parentURL);
      if (existsSync(url)) return { url: url.href, format: 'module', shortCircuit: true };
    }
  }
  return next(specifier, context);
}

export async function load(url, context, next) {
  if (!/\.tsx?$/.test(url)) return next(url, context);
  const file = fileURLToPath(url);
  const text = readFileSync(file, 'utf8');
  const name = createHash('sha256').update(`${tsconfig}\n${file}\n${text}`).digest('hex');
  const kept = new URL(`${name}.js`, cache);
  if (existsSync(kept)) {
    return { format: 'module', source: readFileSync(kept, 'utf8'), shortCircuit: true };
  }
  const source = await translated(file, text);
  const partial = new URL(`${name}.${process.pid}.partial`, cache);
  writeFileSync(partial, source);
  renameSync(partial, kept);
  return { format: 'module', source, shortCircuit: true };
}
