// Owns writing the published JSON Schema to its file: `npx tsx src/model/make-schema.ts`.
// Must not be imported by anything.
// oxlint-disable-next-line no-restricted-imports -- a script of its own, not part of the model
import { writeFileSync } from 'node:fs';
import { makeJsonSchema } from './json-schema.ts';

writeFileSync(new URL('../../public/job.schema.json', import.meta.url), makeJsonSchema());
