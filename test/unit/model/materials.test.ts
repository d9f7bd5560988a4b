import { describe, expect, it } from 'vitest';
import { EPS0 } from '../../../src/base/constants.ts';
import { GUIDES, findGuide } from '../../../src/model/guides.ts';
import { makeEmptyJob, makePart } from '../../../src/model/new-job.ts';
import { BUILDING_MATERIALS } from '../../../src/model/materials/building-materials.ts';
import { findMaterial, MATERIALS } from '../../../src/model/materials/library.ts';
import type { LibraryMaterial } from '../../../src/model/materials/material.ts';
import { describeTreatment, mediumOf, skinDepthMetres } from '../../../src/model/materials/material.ts';
import { materialRemarks, referenceRemarks } from '../../../src/model/remarks.ts';

const job = makeEmptyJob();

function find(id: string): LibraryMaterial {
  const material = findMaterial(job, id);
  if (material === undefined) throw new Error(id);
  return material;
}

describe('the library', () => {
  it('has an id, a name, a source and a range for every entry, and no id twice', () => {
    expect(new Set(MATERIALS.map(({ id }) => id)).size).toBe(MATERIALS.length);
    expect(new Set(MATERIALS.map(({ name }) => name)).size).toBe(MATERIALS.length);
    for (const { id, source, validity } of MATERIALS) {
      expect(id).toMatch(/^[a-z0-9][a-z0-9.-]*$/);
      expect(source.length).toBeGreaterThan(5);
      expect(validity[0]).toBeLessThan(validity[1]);
    }
  });

  it('never makes a medium faster than vacuum or with gain, from 1 MHz to 1 THz', () => {
    for (const material of MATERIALS) {
      for (const frequency of [1e6, 1e9, 1e10, 1e12]) {
        const medium = mediumOf(material, frequency);
        expect(medium.epsilonRelative * medium.muRelative).toBeGreaterThanOrEqual(1);
        expect(medium.sigma).toBeGreaterThanOrEqual(0);
        expect(Number.isFinite(medium.sigma)).toBe(true);
      }
    }
  });

  it('puts the job\u2019s own materials before its entries', () => {
    const own = { id: 'filler', name: 'Filler', permittivity: 3, permeability: 2, conductivity: 0.1, magneticLoss: 4 };
    const material = findMaterial({ materials: [own] }, 'filler');
    expect(material && mediumOf(material, 1e9)).toEqual({
      metal: false,
      epsilonRelative: 3,
      muRelative: 2,
      sigma: 0.1,
      sigmaMagnetic: 4,
    });
    expect(findMaterial(job, 'filler')).toBeUndefined();
  });
});

describe('building materials', () => {
  it('follow eps = a f^b and sigma = c f^d of Rec. ITU-R P.2040', () => {
    // Concrete at 2.4 GHz by hand from a = 5.24, c = 0.0462, d = 0.7822: 0.0462 * exp(0.7822 ln 2.4) = 0.09163.
    const concrete = mediumOf(find('concrete'), 2.4e9);
    expect(concrete.epsilonRelative).toBe(5.24);
    expect(concrete.sigma).toBeCloseTo(0.09163, 4);
    // Wet ground at 2 GHz: 30 * 2^-0.4 = 22.736, 0.15 * 2^1.3 = 0.36934.
    const wet = mediumOf(find('wet-ground'), 2e9);
    expect(wet.epsilonRelative).toBeCloseTo(22.736, 3);
    expect(wet.sigma).toBeCloseTo(0.36934, 4);
  });

  it('carry the source of their row word for word', () => {
    expect(find('brick').source).toContain('the document itself was not read');
    expect(find('brick-2040-1').source).toContain('matched at 9 GHz with a public listing of P.2040-1 values');
    expect(BUILDING_MATERIALS.length).toBe(26);
  });
});

describe('other laws', () => {
  it('a loss tangent becomes the conductivity omega eps tan delta', () => {
    const fr4 = mediumOf(find('fr-4'), 1e9);
    expect(fr4.sigma).toBeCloseTo(2 * Math.PI * 1e9 * EPS0 * 4.4 * 0.02, 12);
  });

  it('water follows the Debye term of Kaatze 1989: half the strength at the relaxation frequency', () => {
    const relaxation = 1 / (2 * Math.PI * 9.36e-12);
    const water = mediumOf(find('water-20c'), relaxation);
    expect(water.epsilonRelative).toBeCloseTo(5.6 + (80.21 - 5.6) / 2, 9);
    expect(water.sigma / (2 * Math.PI * relaxation * EPS0)).toBeCloseTo((80.21 - 5.6) / 2, 9);
  });

  it('copper\u2019s skin is 2.09 \u00b5m deep at 1 GHz (handbook value, from memory)', () => {
    expect(skinDepthMetres(5.8e7, 1, 1e9)).toBeCloseTo(2.09e-6, 8);
  });
});

describe('treatment in words', () => {
  it('of a metal names its skin depth', () => {
    expect(describeTreatment(find('aluminium'), 3.4e9)).toBe('treated as perfect metal; its skin depth at 3.4 GHz is 1.4 µm');
  });

  it('of a material that varies names the values used and where', () => {
    expect(describeTreatment(find('concrete'), 2.4e9)).toBe(
      'treated as \u03b5r = 5.24, \u03c3 = 91.6 mS/m, its values at 2.4 GHz',
    );
  });

  it('of air and of perfect metal says nothing', () => {
    expect(describeTreatment(find('air'), 1e9) + describeTreatment(find('perfect-metal'), 1e9)).toBe('');
  });
});

describe('remarks', () => {
  const brick = makePart(job, 'disc', 'brick', { centre: ['50 mm', '50 mm'], radius: '9 mm' });

  it('warn of a material used outside its range', () => {
    const remarks = materialRemarks({ ...job, parts: [brick], band: { ...job.band, from: '100 MHz', to: '6 GHz' } });
    expect(remarks.map(({ code }) => code)).toEqual(['material range', 'material spread']);
    expect(remarks[0]).toMatchObject({ code: 'material range', path: 'parts[0].material' });
    expect(remarks[0]?.message).toContain('1 GHz to 40 GHz');
  });

  it('say nothing of one within it that hardly varies', () => {
    expect(materialRemarks({ ...job, parts: [brick, { ...brick, id: 'b', material: 'copper' }] })).toEqual([]);
  });

  it('say when values vary over the band', () => {
    const water = { ...brick, material: 'water-20c' };
    const remarks = materialRemarks({ ...job, parts: [water], band: { ...job.band, from: '2 GHz', to: '20 GHz' } });
    expect(remarks.map(({ code }) => code)).toEqual(['material spread']);
    expect(remarks[0]?.message).toContain('11 GHz');
  });

  it('say when the reference run cannot differ', () => {
    expect(referenceRemarks(job)).toHaveLength(1);
    expect(referenceRemarks({ ...job, parts: [brick] })).toEqual([]);
    expect(referenceRemarks({ ...job, reference: 'none' })).toEqual([]);
  });
});

describe('rectangular guides', () => {
  it('are found by either name', () => {
    expect(findGuide('R100')).toBe(findGuide('WR-90'));
    expect(findGuide('wr 90')?.aMetres).toBe(0.02286);
    expect(findGuide('R 1')).toBeUndefined();
  });

  it('have TE10 cutoffs that agree with the published 6.557 GHz of R 100 and lie under their bands', () => {
    expect(findGuide('R 100')?.cutoffHertz).toBeCloseTo(6.55714e9, -5);
    expect(GUIDES).toHaveLength(24);
    for (const { cutoffHertz, bandHertz } of GUIDES) {
      expect(cutoffHertz).toBeLessThan(bandHertz[0]);
      expect(2 * cutoffHertz).toBeGreaterThan(bandHertz[1] * 0.98);
    }
  });
});
