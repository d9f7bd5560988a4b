import { describe, expect, it } from 'vitest';
import { accountForSection, describeEdges, describeSection } from '../../../src/model/describe-section.ts';
import type { EdgeKind } from '../../../src/model/job.ts';
import { makeEmptyJob } from '../../../src/model/new-job.ts';

const job = makeEmptyJob();

describe('the section in words', () => {
  it('with E out of the plane says that E lies along slots and where their cutoff is', () => {
    const words = describeSection(job);
    expect(words).toContain('runs on without end out of the page');
    expect(words).toContain('E lies along every slot');
    // Half of c/6 GHz = 49.97 mm.
    expect(words).toContain('half a wave (25 mm at 6 GHz)');
    expect(words).toContain('H-plane of a rectangular guide of any height');
  });

  it('with H out of the plane says that E lies across and that nothing is cut off', () => {
    const words = describeSection({ ...job, section: 'H out of plane' });
    expect(words).toContain('E lies across every slot');
    expect(words).toContain('no cutoff');
    expect(words).toContain('parallel-plate guide');
  });

  it('says what is idealised', () => {
    expect(accountForSection(job).idealisation).toContain('left out');
  });

  it('leaves the number out when the band cannot be read', () => {
    expect(describeSection({ ...job, band: { ...job.band, to: 'nothing' } })).toContain('half a wave is below cutoff');
  });
});

describe('the edges in words', () => {
  const edges = (left: EdgeKind, right: EdgeKind, bottom: EdgeKind, top: EdgeKind): string =>
    describeEdges({ ...job, sheet: { ...job.sheet, edges: { left, right, bottom, top } } });

  it('are gathered by what they do', () => {
    expect(edges('absorbing', 'absorbing', 'absorbing', 'absorbing')).toBe('All four edges absorb.');
    expect(edges('absorbing', 'absorbing', 'metal', 'metal')).toBe(
      'The left and right edges absorb; the bottom and top edges are metal.',
    );
    expect(edges('metal', 'absorbing', 'absorbing', 'absorbing')).toBe(
      'The left edge is metal; the right, bottom and top edges absorb.',
    );
    expect(edges('absorbing', 'absorbing', 'repeating', 'repeating')).toContain('the bottom and top edges repeat.');
  });
});
