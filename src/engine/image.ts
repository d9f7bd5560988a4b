// Owns the making of a memory image: a growing table of words that ends as the bytes the kernel reads.
// Must not know physics.
import { PAD_COLUMNS } from './layout.ts';

/** Collects the fixed part of an image, which begins at `origin`; offsets are bytes from the image's start, multiples of 16. */
export class ImageWriter {
  private readonly origin: number;
  private readonly buffer: { bytes: ArrayBuffer; i32: Int32Array; f32: Float32Array; f64: Float64Array };
  private end = 0;

  constructor(origin: number) {
    this.origin = origin;
    this.buffer = viewsOf(new ArrayBuffer(1 << 16));
  }

  /** Room for `bytes` more, zeroed; returns their offset. */
  take(bytes: number): number {
    const at = this.end;
    this.end = align(at + bytes);
    if (this.end > this.buffer.bytes.byteLength) {
      const grown = viewsOf(new ArrayBuffer(align(Math.max(this.end, 2 * this.buffer.bytes.byteLength))));
      grown.i32.set(this.buffer.i32);
      Object.assign(this.buffer, grown);
    }
    return this.origin + at;
  }

  word(offset: number, index: number, value: number): void {
    this.buffer.i32[((offset - this.origin) >> 2) + index] = value;
  }

  single(offset: number, index: number, value: number): void {
    this.buffer.f32[((offset - this.origin) >> 2) + index] = value;
  }

  /** A float64 over two words. */
  double(offset: number, index: number, value: number): void {
    const words = new Int32Array(new Float64Array([value]).buffer);
    this.buffer.i32.set(words, ((offset - this.origin) >> 2) + index);
  }

  singles(offset: number, values: ArrayLike<number>): void {
    this.buffer.f32.set(values, (offset - this.origin) >> 2);
  }

  doubles(offset: number, values: ArrayLike<number>): void {
    this.buffer.f64.set(values, (offset - this.origin) >> 3);
  }

  finish(): ArrayBuffer {
    return this.buffer.bytes.slice(0, this.end);
  }
}

/** Hands out zeroed state in front of the fixed part, up to a bound known before the program is written. */
export class StateRoom {
  private end: number;
  private readonly bound: number;

  constructor(from: number, bound: number) {
    this.end = align(from);
    this.bound = bound;
  }

  take(bytes: number): number {
    const at = this.end;
    this.end = align(at + bytes);
    if (this.end > this.bound) throw new Error(`State of ${this.end} bytes is over its bound of ${this.bound}.`);
    return at;
  }
}

function viewsOf(bytes: ArrayBuffer) {
  return { bytes, i32: new Int32Array(bytes), f32: new Float32Array(bytes), f64: new Float64Array(bytes) };
}

export function align(bytes: number): number {
  return Math.ceil(bytes / 16) * 16;
}

/** Floats of one row of a field: pad, unknowns, the last link, filled to whole groups of four. */
export function rowStride(unknowns: number): number {
  return PAD_COLUMNS + align(4 * (unknowns + 1)) / 4;
}
