import type pg from 'pg';
import { DataInUse } from '#server/db/data-folder-lock.ts';

/** Of this application, in PostgreSQL's space of advisory locks. */
const lockNumber = 4_817_026;

/**
 * Takes a database server's database for this process alone, since the job queue counts on one owner. PostgreSQL frees the
 * lock when the process ends, however it ends. Answers the release. Throws `DataInUse` while another process holds it.
 */
export async function lockDatabase(pool: pg.Pool): Promise<() => void> {
  const connection = await pool.connect();
  const { rows } = await connection.query<{ taken: boolean }>('select pg_try_advisory_lock($1) as taken', [
    lockNumber,
  ]);
  if (rows[0]?.taken) return () => connection.release(true);
  connection.release();
  throw new DataInUse(
    'The database of DATABASE_URL is in use by another running Fringeward. Stop that one first, or use another database.',
  );
}
