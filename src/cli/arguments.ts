// Owns the reading of the command line: which command, with which files and options, or why not.
// Must not know what the commands do.
import { parseArgs } from 'node:util';
import type { ParseArgsConfig } from 'node:util';
import { basename, extname } from 'node:path';
import { MOST_THREADS } from '../engine/layout.ts';
import { HELP } from './help.ts';
import type { HelpTopic } from './help.ts';

/** 'all': as many as the machine has cores. */
export type Threads = number | 'all';

export type Invocation =
  | {
      readonly command: 'run';
      readonly jobFile: string;
      readonly directory: string;
      readonly quiet: boolean;
      readonly threads: Threads;
    }
  | { readonly command: 'check'; readonly jobFile: string }
  /** `cells` null: the usual sizes. */
  | { readonly command: 'speed'; readonly cells: number | null; readonly seconds: number; readonly threads: Threads }
  | { readonly command: 'help'; readonly text: string }
  | { readonly command: 'version' }
  | { readonly command: 'misused'; readonly message: string };

const LARGEST_SPEED_SHEET = 8192;

/** Reads what stands after `guidewall` on the command line. */
export function parseCommandLine(words: readonly string[]): Invocation {
  const [first, ...rest] = words;
  if (first === undefined) return misused('No command is given.', 'general');
  if (first === '--help' || first === '-h' || first === 'help') return helpFor(rest[0]);
  if (first === '--version') return { command: 'version' };
  if (!isCommand(first)) return misused(`There is no command "${first}".`, 'general');
  if (rest.includes('--help') || rest.includes('-h')) return { command: 'help', text: HELP[first] };
  switch (first) {
    case 'run':
      return parseRun(rest);
    case 'check':
      return parseCheck(rest);
    case 'speed':
      return parseSpeed(rest);
  }
}

type Command = Exclude<HelpTopic, 'general'>;

function isCommand(word: string): word is Command {
  return word === 'run' || word === 'check' || word === 'speed';
}

function helpFor(topic: string | undefined): Invocation {
  return { command: 'help', text: topic !== undefined && isCommand(topic) ? HELP[topic] : HELP.general };
}

function parseRun(words: readonly string[]): Invocation {
  const read = readOptions(words, { out: { type: 'string' }, quiet: { type: 'boolean' }, threads: { type: 'string' } });
  if ('trouble' in read) return misused(read.trouble, 'run');
  const jobFile = onlyFile(read.files);
  if (jobFile === null) return misused(oneJobNotice(read.files), 'run');
  const out = read.values['out'];
  if (out === '') return misused('--out is empty: give the folder the results go to.', 'run');
  const directory = typeof out === 'string' ? out : `${basename(jobFile, extname(jobFile))}-results`;
  const threads = threadsOf(read.values['threads']);
  if (threads === null) return misused(threadsNotice(read.values['threads']), 'run');
  return { command: 'run', jobFile, directory, quiet: read.values['quiet'] === true, threads };
}

function parseCheck(words: readonly string[]): Invocation {
  const read = readOptions(words, {});
  if ('trouble' in read) return misused(read.trouble, 'check');
  const jobFile = onlyFile(read.files);
  return jobFile === null ? misused(oneJobNotice(read.files), 'check') : { command: 'check', jobFile };
}

function parseSpeed(words: readonly string[]): Invocation {
  const read = readOptions(words, { cells: { type: 'string' }, seconds: { type: 'string' }, threads: { type: 'string' } });
  if ('trouble' in read) return misused(read.trouble, 'speed');
  if (read.files.length > 0) return misused(`speed takes no file, and "${read.files[0]}" is given.`, 'speed');
  const cells = read.values['cells'] === undefined ? null : Number(read.values['cells']);
  if (cells !== null && (!Number.isInteger(cells) || cells < 64 || cells > LARGEST_SPEED_SHEET)) {
    return misused(`--cells ${String(read.values['cells'])}: give a whole number from 64 to ${LARGEST_SPEED_SHEET}.`, 'speed');
  }
  const seconds = Number(read.values['seconds'] ?? 1);
  if (!(seconds >= 0.1 && seconds <= 600)) {
    return misused(`--seconds ${String(read.values['seconds'])}: give a number from 0.1 to 600.`, 'speed');
  }
  const threads = threadsOf(read.values['threads']);
  if (threads === null) return misused(threadsNotice(read.values['threads']), 'speed');
  return { command: 'speed', cells, seconds, threads };
}

/** 'all' when nothing is asked for; null when what is asked for is no number of threads. */
function threadsOf(asked: unknown): Threads | null {
  if (asked === undefined) return 'all';
  const threads = Number(asked);
  return Number.isInteger(threads) && threads >= 1 && threads <= MOST_THREADS ? threads : null;
}

function threadsNotice(asked: unknown): string {
  return `--threads ${String(asked)}: give a whole number from 1 to ${MOST_THREADS}.`;
}

type Read =
  { readonly files: readonly string[]; readonly values: Readonly<Record<string, unknown>> } | { readonly trouble: string };

function readOptions(words: readonly string[], options: NonNullable<ParseArgsConfig['options']>): Read {
  try {
    const { positionals, values } = parseArgs({ args: [...words], options, allowPositionals: true, strict: true });
    return { files: positionals, values };
  } catch (error) {
    // Node appends advice on positional arguments that begin with a dash; the first sentence says what is wrong.
    return { trouble: (error instanceof Error ? error.message : String(error)).split('. To specify')[0] ?? '' };
  }
}

function onlyFile(files: readonly string[]): string | null {
  return files.length === 1 ? (files[0] ?? null) : null;
}

function oneJobNotice(files: readonly string[]): string {
  return files.length === 0
    ? 'No job file is given.'
    : `One job file at a time: ${files.length} are given (${files.join(', ')}).`;
}

function misused(message: string, topic: HelpTopic): Invocation {
  const more = topic === 'general' ? 'guidewall --help' : `guidewall ${topic} --help`;
  return { command: 'misused', message: `${message} See ${more}.` };
}
