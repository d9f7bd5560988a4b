// Owns the facts of the command line's grammar.
// Must not know what the commands do.
import { describe, expect, test } from 'vitest';
import { parseCommandLine } from '../../../src/cli/arguments.ts';

describe('run', () => {
  test('takes the job file and the folder for the results, in either order', () => {
    const expected = { command: 'run', jobFile: 'jobs/slot.json', directory: 'out', quiet: false, threads: 'all' };
    expect(parseCommandLine(['run', 'jobs/slot.json', '--out', 'out'])).toEqual(expected);
    expect(parseCommandLine(['run', '--out=out', 'jobs/slot.json'])).toEqual(expected);
  });

  test('names the folder after the job when none is given', () => {
    expect(parseCommandLine(['run', 'jobs/slot.json'])).toMatchObject({ directory: 'slot-results' });
  });

  test('is refused without a job file', () => {
    expect(parseCommandLine(['run', '--out', 'out'])).toEqual({
      command: 'misused',
      message: 'No job file is given. See guidewall run --help.',
    });
  });

  test('is refused with two job files, which it names', () => {
    expect(parseCommandLine(['run', 'a.json', 'b.json'])).toMatchObject({
      command: 'misused',
      message: expect.stringContaining('2 are given (a.json, b.json)'),
    });
  });

  test('is refused with an option it does not know, which it names', () => {
    expect(parseCommandLine(['run', 'a.json', '--output', 'x'])).toMatchObject({
      command: 'misused',
      message: expect.stringContaining('--output'),
    });
  });

  test('is refused when --out stands without a folder', () => {
    expect(parseCommandLine(['run', 'a.json', '--out'])).toMatchObject({ command: 'misused' });
    expect(parseCommandLine(['run', 'a.json', '--out='])).toMatchObject({ command: 'misused' });
  });
});

describe('threads', () => {
  test.each(['run a.json', 'speed'])('%s takes a number of them from 1 to 8', (words) => {
    expect(parseCommandLine([...words.split(' '), '--threads', '2'])).toMatchObject({ threads: 2 });
  });

  test.each(['0', '9', '1.5', 'many', ''])('"%s" is refused', (asked) => {
    expect(parseCommandLine(['run', 'a.json', `--threads=${asked}`])).toMatchObject({
      command: 'misused',
      message: expect.stringContaining('from 1 to 8'),
    });
  });
});

describe('speed', () => {
  test('measures several sizes for a second each unless told otherwise', () => {
    expect(parseCommandLine(['speed'])).toEqual({ command: 'speed', cells: null, seconds: 1, threads: 'all' });
    expect(parseCommandLine(['speed', '--cells', '256', '--seconds', '0.5'])).toEqual({
      command: 'speed',
      cells: 256,
      seconds: 0.5,
      threads: 'all',
    });
  });

  test.each(['63', '8193', '100.5', 'many', ''])('refuses %j cells', (cells) => {
    expect(parseCommandLine(['speed', `--cells=${cells}`])).toMatchObject({
      command: 'misused',
      message: expect.stringContaining('from 64 to 8192'),
    });
  });

  test.each(['0', '-1', '601', 'NaN'])('refuses %j seconds', (seconds) => {
    expect(parseCommandLine(['speed', `--seconds=${seconds}`])).toMatchObject({ command: 'misused' });
  });
});

describe('help', () => {
  test.each(['run', 'check', 'speed'])('of %s opens with how it is called', (command) => {
    const asked = parseCommandLine([command, '--help']);
    expect(asked).toMatchObject({ command: 'help', text: expect.stringMatching(new RegExp(`^guidewall ${command}`)) });
    expect(parseCommandLine(['help', command])).toEqual(asked);
  });

  test('is given even when the rest of the line is wrong', () => {
    expect(parseCommandLine(['run', '--nonsense', '-h'])).toMatchObject({ command: 'help' });
  });

  test('lists every command', () => {
    const general = parseCommandLine(['--help']);
    for (const command of ['run', 'check', 'speed']) {
      expect(general).toMatchObject({ text: expect.stringContaining(`guidewall ${command}`) });
    }
  });
});

test('an unknown command is named in the answer', () => {
  expect(parseCommandLine(['simulate'])).toEqual({
    command: 'misused',
    message: 'There is no command "simulate". See guidewall --help.',
  });
});

test('an empty command line is misused', () => {
  expect(parseCommandLine([])).toMatchObject({ command: 'misused' });
});
