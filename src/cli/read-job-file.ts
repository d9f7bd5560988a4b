// Owns getting a job from a file on disk.
// Must not know what a job holds.
import { readFile } from 'node:fs/promises';
import { describeError, fail } from '../base/result.ts';
import type { AppError, Result } from '../base/result.ts';
import { parseJob } from '../model/parse-job.ts';
import type { Job } from '../model/job.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';

export async function readJobFile(path: string): Promise<Result<Job>> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    return fail({ code: 'unreadable-file', message: `The job file cannot be read (${reason}).`, hint: 'Check its path.' });
  }
  return parseJob(text);
}

/** Says on the error stream why a job cannot be run, a line for each reason, under the name of the file. */
export function refuse(jobFile: string, errors: readonly AppError[]): ExitCode {
  console.error(`${jobFile}: the job cannot be run.`);
  for (const error of errors) console.error(`  ${describeError(error)}`);
  return EXIT.refused;
}
