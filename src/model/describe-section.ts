// Owns the words for what a two-dimensional section stands for in three dimensions, and for the edges of its sheet.
// Must not know screens, parts, or how fields are computed.
import { C0 } from '../base/constants.ts';
import { formatQuantity, parseQuantity } from '../base/quantity.ts';
import type { EdgeKind, EdgeName, Job } from './job.ts';

export interface SectionAccount {
  /** What three-dimensional thing it is. */
  readonly standsFor: string;
  /** How E lies to a slot, and what that does. */
  readonly slots: string;
  readonly exactFor: string;
  readonly idealisation: string;
}

/** "25 mm at 6 GHz", or null when the band cannot be read. */
function describeHalfWave(job: Job): string | null {
  const top = parseQuantity(job.band.to, 'frequency', job.values);
  if (!top.ok || top.value <= 0) return null;
  return `${formatQuantity(C0 / (2 * top.value), 'length', 3)} at ${formatQuantity(top.value, 'frequency', 4)}`;
}

const IDEALISATION =
  'Nothing real runs on for ever: ends, corners out of the page and finite lengths of slots are left out, so read the result as that of the section alone.';

function accountForElectric(job: Job): SectionAccount {
  const half = describeHalfWave(job);
  const width = half === null ? 'half a wave' : `half a wave (${half})`;
  return {
    standsFor: 'The section stands for a structure that runs on without end out of the page, with E pointing along it.',
    slots: `E lies along every slot: an opening narrower than ${width} is below cutoff and passes little.`,
    exactFor: 'It is exact for the H-plane of a rectangular guide of any height in its TEm0 modes, walls taken as free of loss.',
    idealisation: IDEALISATION,
  };
}

function accountForMagnetic(): SectionAccount {
  return {
    standsFor: 'The section stands for a structure that runs on without end out of the page, with H pointing along it.',
    slots: 'E lies across every slot: however narrow the opening, there is no cutoff, and it leaks at every frequency.',
    exactFor: 'It is exact for a parallel-plate guide, its plates seen edge on.',
    idealisation: IDEALISATION,
  };
}

export function accountForSection(job: Job): SectionAccount {
  return job.section === 'E out of plane' ? accountForElectric(job) : accountForMagnetic();
}

/** The Brief's first sentences. */
export function describeSection(job: Job): string {
  const account = accountForSection(job);
  return `${account.standsFor} ${account.slots} ${account.exactFor}`;
}

const EDGE_ORDER: readonly EdgeName[] = ['left', 'right', 'bottom', 'top'];

/** Verb phrases for one edge and for several. */
const EDGE_WORDS: Readonly<Record<EdgeKind, readonly [one: string, several: string]>> = {
  absorbing: ['absorbs', 'absorb'],
  metal: ['is metal', 'are metal'],
  magnetic: ['is magnetic, a mirror for H', 'are magnetic, mirrors for H'],
  repeating: ['repeats', 'repeat'],
};

function listEdges(names: readonly EdgeName[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}

/** "The left and right edges absorb; the bottom and top edges are metal." */
export function describeEdges(job: Job): string {
  const { edges } = job.sheet;
  const kinds = [...new Set(EDGE_ORDER.map((edge) => edges[edge]))];
  const [only] = kinds;
  if (kinds.length === 1 && only !== undefined) return `All four edges ${EDGE_WORDS[only][1]}.`;
  const clauses = kinds.map((kind) => {
    const names = EDGE_ORDER.filter((edge) => edges[edge] === kind);
    const several = names.length > 1;
    return `the ${listEdges(names)} ${several ? 'edges' : 'edge'} ${EDGE_WORDS[kind][several ? 1 : 0]}`;
  });
  const sentence = clauses.join('; ');
  return `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`;
}
