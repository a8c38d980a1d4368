/** The runs of this process that can be stopped. */
const controllers = new Map<string, AbortController>();

/** Runs `work` under a signal that `stopRunning` pulls. */
export async function whileStoppable<T>(id: string, work: (signal: AbortSignal) => Promise<T>): Promise<T> {
  const controller = new AbortController();
  controllers.set(id, controller);
  try {
    return await work(controller.signal);
  } finally {
    controllers.delete(id);
  }
}

export function stopRunning(id: string): void {
  controllers.get(id)?.abort();
}
