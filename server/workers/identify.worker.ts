import { Refusal } from '#server/http/refusal.ts';
import { identifyTask, inspectTask, pixelsTask, thumbnailTask, type Task } from '#server/workers/tasks.ts';
import type { ProblemCode } from '#shared/problems.ts';

/** A refusal crosses the thread as data, since only plain errors survive the journey. */
export type Answer =
  { readonly result: unknown } | { readonly refusal: { code: ProblemCode; detail: string } };

/** What a worker thread of the pool does with a task. */
export default async function work(task: Task): Promise<Answer> {
  try {
    return { result: await run(task) };
  } catch (error) {
    if (error instanceof Refusal) return { refusal: { code: error.code, detail: error.message } };
    throw error;
  } finally {
    if (task.kind === 'identify') task.progress.close();
  }
}

function run(task: Task): Promise<unknown> {
  switch (task.kind) {
    case 'inspect':
      return inspectTask(task.bytes, task.fileName, task.bench);
    case 'thumbnail':
      return thumbnailTask(task.bytes, task.center);
    case 'pixels':
      return pixelsTask(task.bytes);
    case 'identify': {
      const { progress } = task;
      return identifyTask(task.bytes, task.bench, (step, share) => progress.postMessage({ step, share }));
    }
  }
}
