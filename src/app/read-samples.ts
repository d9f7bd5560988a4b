// Owns reading a drive's samples from the text of a CSV file: time and relative amplitude.
// Must not know files, stores, or how samples are played.
import { parseQuantity } from '../base/quantity.ts';
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import { LIMITS } from '../model/job-schema.ts';

export interface Samples {
  /** Seconds, rising from 0. */
  readonly times: readonly number[];
  readonly values: readonly number[];
  /** What the file's first time was, seconds: it is put at 0. */
  readonly beganSeconds: number;
}

const MEND = 'Give two columns, time in seconds and relative amplitude, one sample a line, times rising.';

function refuse(message: string): Result<Samples> {
  return fail({ code: 'samples', message, hint: MEND });
}

/** Semicolons and tabs leave the comma to be the decimal sign. */
function splitLine(line: string): string[] {
  const separator = line.includes(';') ? ';' : line.includes('\t') ? '\t' : line.includes(',') ? ',' : /\s+/;
  const cells = line.trim().split(separator);
  const decimalComma = separator === ';' || separator === '\t';
  return cells.map((cell) => (decimalComma ? cell.trim().replace(',', '.') : cell.trim()));
}

const NUMBER = /^[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?$/;
/** The unit of time in a heading: "t (ns)", "time [us]". */
const UNIT = /[([]\s*([fpnµum]?s)\s*[)\]]/u;

/** Lines above the first number are headings; a unit of time in them counts. */
export function readSamples(text: string): Result<Samples> {
  const times: number[] = [];
  const values: number[] = [];
  let secondsPerUnit = 1;
  for (const [k, line] of text
    .replace(/^\uFEFF/, '')
    .split(/\r\n|\n|\r/)
    .entries()) {
    if (line.trim() === '' || line.startsWith('#')) continue;
    const [time = '', value = ''] = splitLine(line);
    if (!NUMBER.test(time) || !NUMBER.test(value)) {
      if (times.length > 0) return refuse(`Line ${k + 1} holds "${line.slice(0, 40)}", not a time and an amplitude.`);
      const unit = UNIT.exec(time)?.[1];
      const read = unit === undefined ? null : parseQuantity(`1 ${unit}`, 'time');
      if (read?.ok === true) secondsPerUnit = read.value;
      continue;
    }
    const seconds = Number(time) * secondsPerUnit;
    const last = times.at(-1);
    if (last !== undefined && seconds <= last) return refuse(`Line ${k + 1}: the time ${time} is not above the one before it.`);
    times.push(seconds);
    values.push(Number(value));
  }
  const tooMany = checkCount(times.length);
  if (tooMany !== null) return fail(tooMany);
  const beganSeconds = times[0] ?? 0;
  return ok({ times: times.map((time) => time - beganSeconds), values, beganSeconds });
}

function checkCount(count: number): AppError | null {
  if (count < 2) return { code: 'samples', message: `The file holds ${count} samples; at least 2 are needed.`, hint: MEND };
  if (count <= LIMITS.samples) return null;
  return {
    code: 'samples',
    message: `The file holds ${count} samples; at most ${LIMITS.samples} are taken.`,
    hint: 'Thin them.',
  };
}
