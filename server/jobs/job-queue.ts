import type { Database } from '#server/db/database.ts';

export interface JobContext {
  /** Pulled when the server closes: leave the state as it is and throw; the job runs again at the next start. */
  readonly closing: AbortSignal;
  /** True when a further fault would end the job for good. */
  readonly lastAttempt: boolean;
}

/** One kind of background work. `run` may be called again for the same payload after a crash: it checks state first. */
export interface JobDefinition<Payload extends object> {
  readonly name: string;
  /** How often it is tried when it breaks; being cut off by the end of the process costs no attempt. */
  readonly attempts: number;
  /** How many run at once. */
  readonly concurrency: number;
  run(payload: Payload, context: JobContext): Promise<void>;
}

export interface JobQueue {
  /** Enqueues inside the caller's transaction: the job exists if and only if the transaction commits. */
  send<Payload extends object>(tx: Database, name: string, payload: Payload): Promise<void>;
}
