import type { Database } from '#server/db/database.ts';

/** One kind of background work. `run` may be called again for the same payload after a crash: it checks state first. */
export interface JobDefinition<Payload extends object> {
  readonly name: string;
  /** How often it is tried when it breaks (faults, crashes). */
  readonly attempts: number;
  /** How many run at once. */
  readonly concurrency: number;
  run(payload: Payload): Promise<void>;
}

export interface JobQueue {
  /** Enqueues inside the caller's transaction: the job exists if and only if the transaction commits. */
  send<Payload extends object>(tx: Database, name: string, payload: Payload): Promise<void>;
}
