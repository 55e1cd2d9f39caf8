// Makes a fresh clone ready: installs packages when they are missing or older than the lockfile,
// generates the database client, and builds. Uses nothing but Node, because nothing is installed yet.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const at = (...parts) => join(root, ...parts);
const say = (text) => process.stderr.write(`${text}\n`);

function run(command, args, why) {
  const windows = process.platform === 'win32';
  // Installers talk on standard output; keep that free for the program that follows.
  const result = spawnSync(command, args, { cwd: root, stdio: ['ignore', 2, 2], shell: windows });
  if (result.status !== 0) {
    say(
      `\nCould not ${why} (${command} ${args.join(' ')} ended with ${result.status ?? result.error}).`,
    );
    process.exit(result.status ?? 1);
  }
}

const hash = (text) => createHash('sha256').update(text).digest('hex');

function newestChange(folder) {
  let newest = 0;
  for (const entry of readdirSync(folder, { withFileTypes: true, recursive: true })) {
    if (!entry.isFile() || entry.parentPath.includes('generated')) continue;
    newest = Math.max(newest, statSync(join(entry.parentPath, entry.name)).mtimeMs);
  }
  return newest;
}

const lockHash = hash(readFileSync(at('package-lock.json')));
const lockMark = at('node_modules', '.stillair-lock');
if (!existsSync(lockMark) || readFileSync(lockMark, 'utf8') !== lockHash) {
  say(
    'Installing packages. Where no ready-made database driver can be fetched it is compiled, which takes one to two minutes.',
  );
  run('npm', ['ci', '--no-audit', '--no-fund'], 'install the packages');
  writeFileSync(lockMark, lockHash);
}

const schema = at('prisma', 'schema.prisma');
if (existsSync(schema)) {
  const schemaMark = at('node_modules', '.stillair-schema');
  const schemaHash = hash(readFileSync(schema));
  const generated = existsSync(at('src', 'storage', 'generated'));
  if (!generated || !existsSync(schemaMark) || readFileSync(schemaMark, 'utf8') !== schemaHash) {
    run('npx', ['--no-install', 'prisma', 'generate'], 'generate the database client');
    writeFileSync(schemaMark, schemaHash);
  }
}

const builtMark = at('dist', '.built');
const stale =
  !existsSync(builtMark) ||
  statSync(builtMark).mtimeMs <
    Math.max(newestChange(at('src')), statSync(at('tsconfig.build.json')).mtimeMs);
if (stale || process.argv.includes('--build')) {
  say('Building.');
  run('npx', ['--no-install', 'tsc', '-p', 'tsconfig.build.json'], 'build');
  mkdirSync(at('dist'), { recursive: true });
  writeFileSync(builtMark, new Date().toISOString());
}
