import type { NodePgDatabase } from 'drizzle-orm/node-postgres';

/** The database or a transaction on it. Inside a transaction use only what the transaction hands over. */
export type Database = Pick<
  NodePgDatabase<Record<string, never>>,
  | 'select'
  | 'selectDistinct'
  | 'selectDistinctOn'
  | 'insert'
  | 'update'
  | 'delete'
  | 'execute'
  | 'transaction'
>;
