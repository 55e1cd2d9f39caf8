import { defineConfig } from 'prisma/config';

// The command-line tool wants to download a schema engine that `generate` never uses. Naming any
// executable here keeps it from trying, so a clone builds without that download.
process.env.PRISMA_SCHEMA_ENGINE_BINARY ??= process.execPath;

export default defineConfig({
  schema: 'prisma/schema.prisma',
  migrations: { path: 'prisma/migrations' },
  datasource: { url: process.env.DATABASE_URL ?? 'file:./data/stillair.db' },
});
