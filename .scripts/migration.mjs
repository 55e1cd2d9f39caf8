// Writes the next migration: what prisma/schema.prisma asks for and the migrations do not yet give.
//   npm run db:migrate -- name-of-the-change     writes prisma/migrations/<time>_<name>/migration.sql
//   node .scripts/migration.mjs --check          ends with 1 when schema and migrations differ
// Read the SQL before committing it, and never edit a migration that has left your machine.
// The ordinary tool would download an engine for this; the same engine exists as a package.
import { existsSync, mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { PrismaBetterSqlite3 } from '@prisma/adapter-better-sqlite3';

const root = fileURLToPath(new URL('..', import.meta.url));
const folder = join(root, 'prisma', 'migrations');
const require = createRequire(import.meta.url);

async function engine(schema) {
  // The package exports no path to its parts, so they are addressed as files.
  const parts = join(root, 'node_modules', '@prisma', 'schema-engine-wasm');
  const bindings = await import(pathToFileURL(join(parts, 'schema_engine_bg.js')).href);
  const wasm = readFileSync(join(parts, 'schema_engine_bg.wasm'));
  const { instance } = await WebAssembly.instantiate(wasm, { './schema_engine_bg.js': bindings });
  bindings.__wbg_set_wasm(instance.exports);
  instance.exports.__wbindgen_start?.();
  globalThis.PRISMA_WASM_PANIC_REGISTRY = {
    set_message(text) {
      process.stderr.write(`${text}\n`);
    },
  };
  // The binder belongs to the adapter, so it is found from there.
  const fromAdapter = createRequire(require.resolve('@prisma/adapter-better-sqlite3'));
  const binder = await import(
    pathToFileURL(fromAdapter.resolve('@prisma/driver-adapter-utils')).href
  );
  const adapter = new PrismaBetterSqlite3({ url: ':memory:' });
  // The engine hands a whole migration to a call that this driver limits to one statement.
  const connect = adapter.connectToShadowDb.bind(adapter);
  adapter.connectToShadowDb = async () => {
    const shadow = await connect();
    const one = shadow.executeRaw.bind(shadow);
    shadow.executeRaw = async (query) => {
      if (query.args.length > 0) return one(query);
      await shadow.executeScript(query.sql);
      return 0;
    };
    return shadow;
  };
  return bindings.SchemaEngine.new(
    { datamodels: [['schema.prisma', schema]] },
    () => {},
    binder.bindMigrationAwareSqlAdapterFactory(adapter),
  );
}

function whatTheMigrationsGive() {
  const lockPath = join(folder, 'migration_lock.toml');
  const names = existsSync(folder)
    ? readdirSync(folder, { withFileTypes: true })
        .filter((entry) => entry.isDirectory())
        .map((entry) => entry.name)
        .sort()
    : [];
  if (names.length === 0) return { tag: 'empty' };
  return {
    tag: 'migrations',
    baseDir: folder,
    lockfile: {
      path: 'migration_lock.toml',
      content: readFileSync(lockPath, 'utf8'),
    },
    shadowDbInitScript: '',
    migrationDirectories: names.map((path) => ({
      path,
      migrationFile: {
        path: 'migration.sql',
        content: { tag: 'ok', value: readFileSync(join(folder, path, 'migration.sql'), 'utf8') },
      },
    })),
  };
}

const schema = readFileSync(join(root, 'prisma', 'schema.prisma'), 'utf8');
const { stdout: sql, exitCode } = await (
  await engine(schema)
).diff({
  from: whatTheMigrationsGive(),
  to: { tag: 'schemaDatamodel', files: [{ path: 'schema.prisma', content: schema }] },
  script: true,
  exitCode: true,
  shadowDatabaseUrl: null,
  filters: { externalTables: [], externalEnums: [] },
});

const [argument] = process.argv.slice(2);
const same = exitCode === 0;
if (argument === '--check') {
  process.stdout.write(same ? 'Schema and migrations agree.\n' : `They differ by:\n${sql}\n`);
  process.exit(same ? 0 : 1);
}
if (same) {
  process.stdout.write('Nothing to migrate: the migrations already give this schema.\n');
  process.exit(0);
}
if (argument === undefined || !/^[a-z0-9][a-z0-9-]*$/.test(argument)) {
  process.stderr.write('Name the change in small letters: npm run db:migrate -- add-meters\n');
  process.exit(2);
}
const stamp = new Date().toISOString().replaceAll(/\D/g, '').slice(0, 14);
const target = join(folder, `${stamp}_${argument.replaceAll('-', '_')}`);
mkdirSync(target, { recursive: true });
writeFileSync(join(target, 'migration.sql'), sql.endsWith('\n') ? sql : `${sql}\n`);
writeFileSync(
  join(folder, 'migration_lock.toml'),
  '# Kept by the ordinary tool as well; do not edit.\nprovider = "sqlite"\n',
);
process.stdout.write(`Wrote ${join(target, 'migration.sql')}. Read it before you commit it.\n`);
