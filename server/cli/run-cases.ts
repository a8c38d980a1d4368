import { createWriteStream } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { dirname, resolve } from 'node:path';
import { performance } from 'node:perf_hooks';
import { finished } from 'node:stream/promises';
import type { Writable } from 'node:stream';
import { idOfLine, parseCaseLine } from '#server/cli/case-line.ts';
import { failedPrediction, predictionOf, type Prediction } from '#server/cli/prediction.ts';
import type { EnginePool } from '#server/workers/engine-pool.ts';

export interface CasesRun {
  readonly answered: number;
  readonly failed: number;
}

/**
 * Answers every line of a cases file with a line, in the same order; a case that fails gets a line with `error` and the
 * run goes on. Rejects only when the cases cannot be read or the answers cannot be written.
 */
export async function runCases(
  pool: EnginePool,
  casesFile: string,
  out: string | null,
  threads: number,
  onAnswer: (done: number, all: number) => void,
): Promise<CasesRun> {
  const lines = (await readFile(casesFile, 'utf8')).split(/\r?\n/).filter((line) => line.trim() !== '');
  const sink: Writable = out === null ? process.stdout : createWriteStream(out);
  const written = out === null ? null : finished(sink);
  const answers = new Array<Prediction | undefined>(lines.length);
  let next = 0;
  let printed = 0;
  let done = 0;
  let failed = 0;
  const flush = () => {
    for (; printed < answers.length; printed++) {
      const answer = answers[printed];
      if (!answer) return;
      sink.write(`${JSON.stringify(answer)}\n`);
    }
  };
  const takeTurns = async () => {
    for (let i = next++; i < lines.length; i = next++) {
      const answer = await answerLine(pool, lines[i], i + 1, dirname(casesFile));
      answers[i] = answer;
      done += 1;
      if (answer.error !== undefined) failed += 1;
      flush();
      onAnswer(done, lines.length);
    }
  };
  await Promise.all(Array.from({ length: Math.min(threads, lines.length) }, takeTurns));
  if (written) {
    sink.end();
    await written;
  }
  return { answered: lines.length, failed };
}

async function answerLine(
  pool: EnginePool,
  line: string,
  number: number,
  folder: string,
): Promise<Prediction> {
  const id = idOfLine(line, number);
  const begun = performance.now();
  try {
    const { file, bench } = parseCaseLine(line);
    const bytes = await readFile(resolve(folder, file));
    const outcome = await pool.identify(bytes, bench, () => {}, new AbortController().signal);
    return predictionOf(id, outcome, performance.now() - begun);
  } catch (error) {
    const words = error instanceof Error ? error.message : String(error);
    return failedPrediction(id, words, performance.now() - begun);
  }
}
