// Owns the published JSON Schema, made from the validator.
// Must not know files.
import * as z from 'zod/mini';
import { JOB_SCHEMA } from './job-schema.ts';

/** What a person may write: everything with a default may be left out. Draft 2020-12, as text. */
export function makeJsonSchema(): string {
  const schema = z.toJSONSchema(JOB_SCHEMA, { io: 'input' });
  const head = {
    $schema: schema.$schema,
    title: 'Guidewall job',
    description: 'A cross-section and the waves on it. Lengths, frequencies and the like are texts with units.',
  };
  // Editors find the schema by this key; loading drops it.
  const properties = { $schema: { type: 'string' }, ...schema.properties };
  return `${JSON.stringify({ ...head, ...schema, properties }, null, 1)}\n`;
}
