import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { connectEmbedded, connectServer, type DatabaseClient } from '#server/db/client.ts';

/** A fresh, empty database: in memory, or one of its own on the server of DATABASE_URL. */
export async function freshDatabase(): Promise<DatabaseClient> {
  const url = process.env['DATABASE_URL'];
  if (url === undefined) return connectEmbedded();
  const name = `fringeward_test_${randomBytes(6).toString('hex')}`;
  await administer(url, `create database ${name}`);
  const own = new URL(url);
  own.pathname = `/${name}`;
  const client = connectServer(own.href);
  return {
    ...client,
    async close() {
      await client.close();
      await administer(url, `drop database ${name} with (force)`);
    },
  };
}

async function administer(url: string, statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
