import { mkdir, readdir, rename, rm } from 'node:fs/promises';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { PGlite } from '@electric-sql/pglite';
import { createPgConfig } from '@electric-sql/pglite/node-postgres';
import { drizzle } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import type { Database } from '#server/db/database.ts';

export interface DatabaseClient {
  readonly db: Database;
  /** For what speaks SQL itself: sessions and the job queue. */
  readonly pool: pg.Pool;
  close(): Promise<void>;
}

/** A PostgreSQL server. */
export function connectServer(url: string): DatabaseClient {
  const pool = new pg.Pool({ connectionString: url, max: 8 });
  // A broken idle connection is replaced by the pool; the query that meets it reports it.
  pool.on('error', () => undefined);
  return { db: drizzle(pool), pool, close: () => pool.end() };
}

/** The embedded database, on disk or (without a folder) in memory. */
export async function connectEmbedded(folder?: string): Promise<DatabaseClient> {
  const lite = folder === undefined ? await PGlite.create() : await openFolder(folder);
  const pool = new pg.Pool(withoutTypeParsers(createPgConfig(lite)));
  pool.on('error', () => undefined);
  return {
    db: drizzle(pool),
    pool,
    async close() {
      await pool.end();
      await lite.close();
    },
  };
}

/**
 * Drizzle gives every query its type parsers as `types`; pg hands them on to the connection's `parse`, where the embedded
 * database expects a list of type ids and breaks in the middle of a message: every query with parameters would fail.
 */
function withoutTypeParsers(config: ReturnType<typeof createPgConfig>) {
  const connection = config.connection as unknown as { parse(query: { types?: unknown }): void };
  const parse = connection.parse.bind(connection);
  connection.parse = (query) => parse(Array.isArray(query.types) ? query : { ...query, types: undefined });
  return config;
}

/**
 * A folder that a killed first start left half-made cannot be opened: so a new database is made in a sibling folder and
 * moved into place when it is whole.
 */
async function openFolder(folder: string): Promise<PGlite> {
  const final = join(folder, 'database');
  const draft = join(folder, 'database.new');
  await mkdir(folder, { recursive: true });
  for (const entry of await readdir(folder))
    if (entry.startsWith('database.new')) await rm(join(folder, entry), { recursive: true, force: true });
  if (!existsSync(final)) {
    const fresh = await PGlite.create(draft);
    await fresh.close();
    await rename(draft, final);
  }
  return PGlite.create(final);
}
