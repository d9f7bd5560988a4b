// Owns the examples that come with the program: their list and how one is read.
// Must not know React components or the run.
import type { AppError, Result } from '../base/result.ts';
import { fail, ok } from '../base/result.ts';
import type { Job } from '../model/job.ts';
import { parseJob } from '../model/parse-job.ts';

export interface Example {
  readonly id: string;
  readonly title: string;
  readonly file: string;
  /** What to look at, in a line. */
  readonly lookAt: string;
}

type Fetch = (address: string) => Promise<Response>;

function missing(file: string, reason: string): AppError {
  return {
    code: 'example',
    message: `The example file ${file} could not be read (${reason}).`,
    hint: 'Load the page again; it needs the server it came from for that.',
  };
}

async function readText(file: string, fetcher: Fetch): Promise<Result<string>> {
  try {
    const response = await fetcher(`./examples/${file}`);
    return response.ok ? ok(await response.text()) : fail(missing(file, `status ${response.status}`));
  } catch (error) {
    return fail(missing(file, error instanceof Error ? error.message : String(error)));
  }
}

function isExample(value: unknown): value is Example {
  const keys: readonly string[] = ['id', 'title', 'file', 'lookAt'];
  return typeof value === 'object' && value !== null && keys.every((key) => typeof Reflect.get(value, key) === 'string');
}

export class ExampleShelf {
  private list: readonly Example[] | null = null;
  private readonly jobs = new Map<string, Job>();
  private readonly fetcher: Fetch;

  constructor(fetcher: Fetch) {
    this.fetcher = fetcher;
  }

  async examples(): Promise<Result<readonly Example[]>> {
    if (this.list !== null) return ok(this.list);
    const text = await readText('index.json', this.fetcher);
    if (!text.ok) return text;
    try {
      const parsed: unknown = JSON.parse(text.value);
      if (!Array.isArray(parsed) || !parsed.every(isExample)) return fail(missing('index.json', 'its form is not known'));
      this.list = parsed;
      return ok(parsed);
    } catch (error) {
      return fail(missing('index.json', error instanceof Error ? error.message : String(error)));
    }
  }

  async job(example: Example): Promise<Result<Job>> {
    const known = this.jobs.get(example.id);
    if (known !== undefined) return ok(known);
    const text = await readText(example.file, this.fetcher);
    if (!text.ok) return text;
    const job = parseJob(text.value);
    if (job.ok) this.jobs.set(example.id, job.value);
    return job;
  }

  /** Brings all of them in while the page is fresh: after that nothing is fetched any more. */
  async preload(): Promise<void> {
    const list = await this.examples();
    if (list.ok) await Promise.all(list.value.map((example) => this.job(example)));
  }
}

export const exampleShelf = new ExampleShelf((address) => fetch(address));
