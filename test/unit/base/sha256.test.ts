import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { sha256 } from '../../../src/base/sha256.ts';

describe('SHA-256', () => {
  it('gives the digests of FIPS 180-4, appendix B', () => {
    expect(sha256('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
    expect(sha256('abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq')).toBe(
      '248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1',
    );
  });

  it('agrees with the platform over every padding length and over all planes of Unicode', () => {
    for (let length = 0; length < 130; length += 1) {
      const text = ['a', 'é', '€', '😀'].map((character) => character.repeat(length)).join('');
      expect(sha256(text)).toBe(createHash('sha256').update(text).digest('hex'));
    }
  });
});
