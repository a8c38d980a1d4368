import { readFile } from 'node:fs/promises';
import { basename } from 'node:path';
import { performance } from 'node:perf_hooks';
import { fileURLToPath } from 'node:url';
import { parseArguments, UsageError, type Command } from '#server/cli/arguments.ts';
import { help } from '#server/cli/help.ts';
import { predictionOf } from '#server/cli/prediction.ts';
import { resultTable } from '#server/cli/result-table.ts';
import { runCases } from '#server/cli/run-cases.ts';
import { createWorkerPool } from '#server/workers/worker-pool.ts';

/** 0 done, 1 something failed, 2 the arguments make no sense. */
async function main(words: readonly string[]): Promise<number> {
  let command: Command;
  try {
    command = parseArguments(words);
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    process.stderr.write(`${error.message}\n`);
    return 2;
  }
  switch (command.kind) {
    case 'help':
      process.stdout.write(help);
      return 0;
    case 'cases':
      return identifyCases(command);
    case 'picture':
      return identifyPicture(command);
  }
}

/** The worker is bundled beside the command. */
const workerFile = fileURLToPath(new URL('identify.worker.js', import.meta.url));

async function identifyCases(command: Extract<Command, { kind: 'cases' }>): Promise<number> {
  const pool = createWorkerPool(workerFile, { threads: command.threads });
  try {
    const { answered, failed } = await runCases(
      pool,
      command.file,
      command.out,
      command.threads,
      (done, all) => {
        if (process.stderr.isTTY) process.stderr.write(`\r${done} of ${all}`);
      },
    );
    process.stderr.write(
      `${process.stderr.isTTY ? '\n' : ''}${answered} cases answered, ${failed} of them with an error.\n`,
    );
    return 0;
  } catch (error) {
    process.stderr.write(`The cases could not be run: ${wordsOf(error)}\n`);
    return 1;
  } finally {
    await pool.close();
  }
}

async function identifyPicture(command: Extract<Command, { kind: 'picture' }>): Promise<number> {
  const pool = createWorkerPool(workerFile, { threads: 1 });
  const begun = performance.now();
  const tell = (step: string, share: number) => {
    if (process.stderr.isTTY)
      process.stderr.write(`\r\x1b[K${share < 1 ? `${Math.round(100 * share)} %  ${step}` : ''}`);
  };
  try {
    const bytes = await readFile(command.file);
    const outcome = await pool.identify(bytes, command.bench, tell, new AbortController().signal);
    const elapsed = performance.now() - begun;
    process.stdout.write(
      command.json
        ? `${JSON.stringify(predictionOf(basename(command.file), outcome, elapsed), null, 2)}\n`
        : resultTable(outcome),
    );
    return 0;
  } catch (error) {
    process.stderr.write(`The picture could not be identified: ${wordsOf(error)}\n`);
    return 1;
  } finally {
    await pool.close();
  }
}

function wordsOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

process.exitCode = await main(process.argv.slice(2));
