import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { NodePgDatabase } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import type { Database } from '#server/db/database.ts';

/** Brings the database to the present schema; each migration runs in a transaction. */
export async function migrateDatabase(db: Database): Promise<void> {
  const bundled = fileURLToPath(new URL('./migrations', import.meta.url));
  const folder = existsSync(bundled) ? bundled : 'server/db/migrations';
  await migrate(db as NodePgDatabase<Record<string, never>>, { migrationsFolder: folder });
}
