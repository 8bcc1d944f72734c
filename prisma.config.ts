/**
 * Settings of Prisma's own tools. Only `prisma generate` runs through them: migrations run through `prisma/migrate.ts`.
 *
 * The tools insist on a downloaded schema engine before they start, though generating needs none. Naming any executable
 * file satisfies that check, so generating works without a network.
 */
import { defineConfig } from 'prisma/config';

process.env.PRISMA_SCHEMA_ENGINE_BINARY ??= process.execPath;

export default defineConfig({
  schema: 'prisma/schema.prisma',
  migrations: { path: 'prisma/migrations' },
});
