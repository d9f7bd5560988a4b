// Owns the SHA-256 digest of a text, the same on every platform and without waiting.
// Must not know what is hashed.

/** Fractional part of a root of a prime, as 32 bits: the constants of FIPS 180-4 are defined so. */
function fraction(root: number): number {
  return Math.floor((root - Math.floor(root)) * 2 ** 32) | 0;
}

function firstPrimes(count: number): number[] {
  const primes: number[] = [];
  for (let n = 2; primes.length < count; n += 1) if (primes.every((prime) => n % prime !== 0)) primes.push(n);
  return primes;
}

const PRIMES = firstPrimes(64);
const ROUND_CONSTANTS = Int32Array.from(PRIMES, (prime) => fraction(Math.cbrt(prime)));
const START = Int32Array.from(PRIMES.slice(0, 8), (prime) => fraction(Math.sqrt(prime)));

function encodeUtf8(text: string): number[] {
  const bytes: number[] = [];
  for (const character of text) {
    const code = character.codePointAt(0) ?? 0;
    if (code < 0x80) bytes.push(code);
    else if (code < 0x800) bytes.push(0xc0 | (code >> 6), 0x80 | (code & 63));
    else if (code < 0x10000) bytes.push(0xe0 | (code >> 12), 0x80 | ((code >> 6) & 63), 0x80 | (code & 63));
    else bytes.push(0xf0 | (code >> 18), 0x80 | ((code >> 12) & 63), 0x80 | ((code >> 6) & 63), 0x80 | (code & 63));
  }
  return bytes;
}

/** The message, a one bit, zeros, and its length in bits: a whole number of blocks of 64 bytes. */
function pad(bytes: readonly number[]): DataView {
  const blocks = Math.ceil((bytes.length + 9) / 64);
  const padded = new Uint8Array(blocks * 64);
  padded.set(bytes);
  padded[bytes.length] = 0x80;
  const view = new DataView(padded.buffer);
  view.setUint32(padded.length - 8, Math.floor(bytes.length / 2 ** 29));
  view.setUint32(padded.length - 4, (bytes.length << 3) >>> 0);
  return view;
}

function rotate(word: number, bits: number): number {
  return (word >>> bits) | (word << (32 - bits));
}

function expandInto(schedule: Int32Array, message: DataView, offset: number): void {
  for (let t = 0; t < 16; t += 1) schedule[t] = message.getInt32(offset + 4 * t);
  for (let t = 16; t < 64; t += 1) {
    const [w2, w7, w15, w16] = [schedule[t - 2] ?? 0, schedule[t - 7] ?? 0, schedule[t - 15] ?? 0, schedule[t - 16] ?? 0];
    const s0 = rotate(w15, 7) ^ rotate(w15, 18) ^ (w15 >>> 3);
    const s1 = rotate(w2, 17) ^ rotate(w2, 19) ^ (w2 >>> 10);
    schedule[t] = (w16 + s0 + w7 + s1) | 0;
  }
}

/** Hex digest, 64 digits (FIPS 180-4). */
export function sha256(text: string): string {
  const message = pad(encodeUtf8(text));
  const state = Int32Array.from(START);
  const schedule = new Int32Array(64);
  for (let offset = 0; offset < message.byteLength; offset += 64) {
    expandInto(schedule, message, offset);
    let [a = 0, b = 0, c = 0, d = 0, e = 0, f = 0, g = 0, h = 0] = state;
    for (let t = 0; t < 64; t += 1) {
      const s1 = rotate(e, 6) ^ rotate(e, 11) ^ rotate(e, 25);
      const choice = (e & f) ^ (~e & g);
      const t1 = (h + s1 + choice + (ROUND_CONSTANTS[t] ?? 0) + (schedule[t] ?? 0)) | 0;
      const s0 = rotate(a, 2) ^ rotate(a, 13) ^ rotate(a, 22);
      const majority = (a & b) ^ (a & c) ^ (b & c);
      [h, g, f, e, d, c, b, a] = [g, f, e, (d + t1) | 0, c, b, a, (t1 + s0 + majority) | 0];
    }
    for (const [k, word] of [a, b, c, d, e, f, g, h].entries()) state[k] = ((state[k] ?? 0) + word) | 0;
  }
  return Array.from(state, (word) => (word >>> 0).toString(16).padStart(8, '0')).join('');
}
