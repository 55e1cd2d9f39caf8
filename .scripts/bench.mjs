// Runs every bench of test/bench on the sources as they stand, one after the other, and says on what
// machine. Rates are per second of processor time: a busy machine slows a bench, but not its figures.
import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { cpus, loadavg } from 'node:os';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const folder = new URL('../test/bench/', import.meta.url);
const benches = readdirSync(folder).filter((name) => name.endsWith('.bench.ts'));
const wanted = process.argv.slice(2);
const processors = cpus();

console.log(
  `${processors[0]?.model ?? 'unknown processor'}, ${processors.length} cores, Node ${process.version}`,
);
console.log(`load over the last minute: ${loadavg()[0].toFixed(1)}`);

let failed = false;
for (const name of benches) {
  const title = name.replace('.bench.ts', '');
  if (wanted.length > 0 && !wanted.includes(title)) continue;
  console.log(`\n${title}`);
  const program = `const { benchLines } = await import(${JSON.stringify(new URL(name, folder).href)});
for (const line of await benchLines()) console.log('  ' + line);`;
  // A process of its own each, so that no bench finds the code warmed or the heap filled by another.
  const { status } = spawnSync(
    process.execPath,
    [
      '--expose-gc',
      '--import',
      './.scripts/run-source.mjs',
      '--input-type=module',
      '--eval',
      program,
    ],
    { cwd: root, stdio: 'inherit' },
  );
  failed ||= status !== 0;
}
process.exitCode = failed ? 1 : 0;
