import type { Database } from '#server/db/database.ts';
import { findLaboratory } from '#server/db/laboratory-store.ts';
import { hasPeople } from '#server/features/people/service.ts';

/** The data are of the other kind than the setting DEMO says. */
export class WrongKind extends Error {}

/** The demo laboratory has published passwords and a laboratory's own data never do: neither is served as the other. */
export async function requireKind(db: Database, demo: boolean): Promise<void> {
  const own = (await findLaboratory(db))?.kind === 'own';
  if (demo && own)
    throw new WrongKind(
      "These are a laboratory's own data, and DEMO is on. Set DEMO=off to serve them, or set DATA_DIR to another folder for the demo laboratory.",
    );
  if (!demo && !own && (await hasPeople(db)))
    throw new WrongKind(
      'This is the demo laboratory with its published passwords, and DEMO is off. Set DATA_DIR (or DATABASE_URL) to an empty place for your own laboratory, or DEMO=on to serve the demo.',
    );
}
