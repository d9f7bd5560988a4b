import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { makeJsonSchema } from '../../../src/model/json-schema.ts';

describe('the published JSON Schema', () => {
  it('is the one the validator gives (make it anew with: npx tsx src/model/make-schema.ts)', () => {
    const file = readFileSync(new URL('../../../public/job.schema.json', import.meta.url), 'utf8');
    expect(JSON.parse(file)).toEqual(JSON.parse(makeJsonSchema()));
  });

  it('asks of a hand-written job its version, section, band and sheet only', () => {
    const schema = JSON.parse(makeJsonSchema()) as {
      required: string[];
      properties: { band: { required: string[] }; sheet: { required: string[] } };
    };
    expect(schema.required.toSorted()).toEqual(['band', 'guidewall', 'section', 'sheet']);
    expect(schema.properties.band.required).toEqual(['from', 'to']);
    expect(schema.properties.sheet.required).toEqual(['width', 'height']);
  });
});
