import type { Database } from '#server/db/database.ts';
import { laboratory } from '#server/db/schema/laboratory.ts';

/** What this installation is, or undefined until its first start is complete. */
export async function findLaboratory(db: Database) {
  return (await db.select().from(laboratory)).at(0);
}

export async function insertLaboratory(
  db: Database,
  kind: 'demo' | 'own',
  name: string,
  at: Date,
): Promise<void> {
  await db.insert(laboratory).values({ id: 1, kind, name, createdAt: at }).onConflictDoNothing();
}
