// Everything CI runs, in the order that fails fastest. `npm run check` is the only entry.
import { spawnSync } from 'node:child_process';

const steps = [
  ['format', 'npm', ['run', '--silent', 'format:check']],
  ['types', 'npm', ['run', '--silent', 'types']],
  ['lint', 'npm', ['run', '--silent', 'lint']],
  ['arrows', 'npm', ['run', '--silent', 'deps']],
  ['dead code', 'npm', ['run', '--silent', 'knip']],
  ['tests', 'npm', ['test', '--silent']],
];

const prepared = spawnSync('node', ['.scripts/prepare.mjs'], { stdio: 'inherit' });
if (prepared.status !== 0) process.exit(prepared.status ?? 1);

for (const [name, command, args] of steps) {
  const started = Date.now();
  process.stderr.write(`-- ${name}\n`);
  const { status } = spawnSync(command, args, { stdio: 'inherit' });
  if (status !== 0) {
    process.stderr.write(
      `-- ${name} failed after ${((Date.now() - started) / 1000).toFixed(1)} s\n`,
    );
    process.exit(status ?? 1);
  }
  process.stderr.write(`-- ${name} ok, ${((Date.now() - started) / 1000).toFixed(1)} s\n`);
}
