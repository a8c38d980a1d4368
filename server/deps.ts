import type { Logger } from 'pino';
import type { Database } from '#server/db/database.ts';
import type { JobQueue } from '#server/jobs/job-queue.ts';
import type { PictureStorage } from '#server/storage/storage.ts';
import type { EnginePool } from '#server/workers/engine-pool.ts';

/** What services need from outside; handed in by main (or by a test). */
export interface Deps {
  readonly db: Database;
  readonly storage: PictureStorage;
  readonly jobs: JobQueue;
  readonly engine: EnginePool;
  readonly clock: () => Date;
  readonly newId: () => string;
  readonly log: Logger;
  readonly settings: {
    readonly baseUrl: string;
    readonly laboratory: string;
    readonly demo: boolean;
    /** Mail is held in the outbox when there is no server to send it by. */
    readonly mailServer: string | undefined;
    readonly mailFrom: string;
  };
}
