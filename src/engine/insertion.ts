// Owns what is read from spectra: insertion ratio, level and spectrum at a probe, and the floor that hides them.
// Must not know plots, files or workers: a run record fits the structural types here.

interface ComplexArray {
  readonly re: ArrayLike<number>;
  readonly im: ArrayLike<number>;
}

/** A finished run as the readings see it. */
export interface SpectrumRun {
  readonly components: readonly string[];
  readonly dtSeconds: number;
  readonly frequenciesHertz: ArrayLike<number>;
  readonly traces: readonly { readonly probeId: string; readonly samples: readonly ArrayLike<number>[] }[];
  readonly spectra: readonly { readonly probeId: string; readonly components: readonly ComplexArray[] }[];
  readonly driveSpectrum: ComplexArray;
}

/** Why a point is not known, in the order of the numbers in `Curve.cause`. */
export const CAUSES = [
  'known',
  'hidden by the end of the record or by single precision',
  'the reference field is hidden itself',
  'the drive holds too little there',
] as const;

export interface Curve {
  /** dB of the quantity, one per frequency of the run. */
  readonly db: Float64Array;
  /** dB below which nothing can be read. */
  readonly floorDb: Float64Array;
  /** Index into CAUSES, one per frequency. */
  readonly cause: Uint8Array;
}

/** A drive this far below its strongest frequency in the band is too weak to divide by. */
const WEAKEST_DRIVE = 0.01;
const SINGLE_PRECISION = 2 ** -24;

/** Magnitude of a component ('Ez') or vector ('|E|', '|H|') at a probe, and the noise it may hold, per frequency, in field / Hz. */
export interface Amplitude {
  readonly size: Float64Array;
  readonly noise: Float64Array;
}

/** Components that make up a name: itself, or all of the vector. */
function membersOf(run: SpectrumRun, name: string): number[] {
  const letter = name.startsWith('|') ? name[1] : null;
  return [...run.components.keys()].filter((k) =>
    letter === null ? run.components[k] === name : run.components[k]!.startsWith(letter!),
  );
}

/** A run is read by plots, tables and files, and a reference by every run after it: each reading is made once. */
const amplitudes = new WeakMap<SpectrumRun, Map<string, Amplitude | null>>();

/** Null when the run has no such probe or component. A run must not be changed once it has been read. */
export function amplitudeAt(run: SpectrumRun, probeId: string, name: string): Amplitude | null {
  let known = amplitudes.get(run);
  if (known === undefined) amplitudes.set(run, (known = new Map()));
  const key = `${name} ${probeId}`;
  let found = known.get(key);
  if (found === undefined) known.set(key, (found = makeAmplitude(run, probeId, name)));
  return found;
}

function makeAmplitude(run: SpectrumRun, probeId: string, name: string): Amplitude | null {
  const spectrum = run.spectra.find((one) => one.probeId === probeId);
  const trace = run.traces.find((one) => one.probeId === probeId);
  const members = membersOf(run, name);
  if (spectrum === undefined || trace === undefined || members.length === 0) return null;
  const n = run.frequenciesHertz.length;
  const size = new Float64Array(n);
  const noise = new Float64Array(n);
  for (const member of members) {
    const { re, im } = spectrum.components[member]!;
    for (let k = 0; k < n; k++) size[k]! += re[k]! ** 2 + im[k]! ** 2;
    addTraceNoise(noise, trace.samples[member]!, run);
  }
  return { size: size.map(Math.sqrt), noise: noise.map(Math.sqrt) };
}

/**
 * Adds the square of what a spectrum of this trace cannot show, (field / Hz)^2: an estimate on the safe side, no bound.
 * Single precision: each step rounds the field by up to 2^-24 of its size; over the record these add like a random walk,
 * 2^-24 dt sqrt(sum x^2), at every frequency alike.
 * Truncation: what the record cuts off goes on as its end does. The transform of the last stretches of the record (one to
 * three periods of the lowest frequency but at most a quarter of it; the largest of several, for each alone may pass
 * through zero) is what they added at f; if they decay by r from one to the next, what is still to come is r / (1 - r) of it, and no less than it where f is
 * off the ringing. Without decay it may go on for another record, unless it is the drive that goes on: then drive and field
 * are cut off alike, and their ratio lacks only what would ring on after the drive, about as long as the field took to settle.
 */
function addTraceNoise(power: Float64Array, samples: ArrayLike<number>, run: SpectrumRun): void {
  const { dtSeconds, frequenciesHertz } = run;
  const count = samples.length;
  let squares = 0;
  for (let n = 0; n < count; n++) squares += samples[n]! ** 2;
  const rounding = SINGLE_PRECISION * dtSeconds * Math.sqrt(squares);
  const lowest = Math.max(frequenciesHertz[0]!, 1 / (dtSeconds * Math.max(count, 1)));
  const period = Math.max(1, Math.min(Math.floor(count / 12), Math.ceil(1 / (lowest * dtSeconds))));
  const last = largest(samples, count - period, count);
  const before = largest(samples, count - 2 * period, count - period);
  const decay = before > last ? last / before : 1;
  const ringing = decay < 1 ? Math.min(count / period, Math.max(1, decay / (1 - decay))) : count / period;
  const toCome = decay > STEADY && driveGoesOn(run, count) ? settledAfter(samples, period, last) : ringing;
  const looks = END_STRETCHES.map((stretch) => Math.min(count, Math.round(stretch * period)));
  for (let k = 0; k < power.length; k++) {
    const tail = last === 0 ? 0 : toCome * largestEnd(samples, looks, frequenciesHertz[k]! * dtSeconds) * dtSeconds;
    power[k]! += rounding ** 2 + tail ** 2;
  }
}

/** A field driven on keeps at least this share of its size from one period to the next. */
const STEADY = 0.9;

/** A unit drive that goes on for the whole record has a spectrum of half its length at its frequency; a pulse, a tenth or less. */
function driveGoesOn(run: SpectrumRun, count: number): boolean {
  return strongestDrive(run) >= 0.25 * count * run.dtSeconds;
}

/** Periods until the largest sample of each stays within 1/e of what it is at the end. */
function settledAfter(samples: ArrayLike<number>, period: number, last: number): number {
  let from = samples.length - period;
  while (from > 0 && Math.abs(largest(samples, from - period, from) - last) < last / Math.E) from -= period;
  return Math.max(1, from / period);
}

/** Stretches looked at, in periods of the lowest frequency. */
const END_STRETCHES = [1, 1.3, 1.7, 2.2, 3];

/** Largest |sum x[n] exp(-j 2 pi cycles n)| over the last `looks` samples (rising counts). */
function largestEnd(samples: ArrayLike<number>, looks: readonly number[], cycles: number): number {
  const cos = Math.cos(2 * Math.PI * cycles);
  const sin = Math.sin(2 * Math.PI * cycles);
  let [wr, wi, re, im, most, look] = [1, 0, 0, 0, 0, 0];
  const deepest = looks[looks.length - 1]!;
  for (let back = 1; back <= deepest; back++) {
    const x = samples[samples.length - back]!;
    re += x * wr;
    im += x * wi;
    [wr, wi] = [wr * cos - wi * sin, wr * sin + wi * cos];
    while (looks[look] === back) {
      most = Math.max(most, Math.hypot(re, im));
      look++;
    }
  }
  return most;
}

function largest(samples: ArrayLike<number>, from: number, to: number): number {
  let most = 0;
  for (let n = Math.max(0, from); n < to; n++) most = Math.max(most, Math.abs(samples[n]!));
  return most;
}

export function decibels(ratio: number): number {
  return 20 * Math.log10(ratio);
}

function strongestDrive({ driveSpectrum: { re, im } }: SpectrumRun): number {
  let most = 0;
  for (let k = 0; k < re.length; k++) most = Math.max(most, Math.hypot(re[k]!, im[k]!));
  return most;
}

/** Frequencies where the drive holds enough to divide by. */
function strongDrive(run: SpectrumRun): (k: number) => boolean {
  const { re, im } = run.driveSpectrum;
  const most = strongestDrive(run);
  return (k) => Math.hypot(re[k]!, im[k]!) >= WEAKEST_DRIVE * most;
}

/**
 * Insertion ratio |F| / |F reference| in dB at a probe: with the parts over without them. Both runs must have the same
 * frequencies (they do when made from one job). Null when either lacks the probe or component.
 */
export function insertionCurve(main: SpectrumRun, reference: SpectrumRun, probeId: string, name: string): Curve | null {
  const own = amplitudeAt(main, probeId, name);
  const other = amplitudeAt(reference, probeId, name);
  if (own === null || other === null || own.size.length !== other.size.length) return null;
  const strong = strongDrive(main);
  return makeCurve(
    own,
    (k) => other.size[k]!,
    (k) => (strong(k) ? (other.size[k]! > other.noise[k]! ? 0 : 2) : 3),
  );
}

/**
 * Level in dB over a microvolt (E) or microampere (H) per metre: the steady field when the drive has, at that frequency
 * alone, the amplitude given in the job: F(f) / D(f), D being the spectrum of the unit waveform. RMS is 3.01 dB less.
 */
export function levelCurve(run: SpectrumRun, probeId: string, name: string, rms: boolean): Curve | null {
  const own = amplitudeAt(run, probeId, name);
  if (own === null) return null;
  const { re, im } = run.driveSpectrum;
  const strong = strongDrive(run);
  const unit = 1e-6 * (rms ? Math.SQRT2 : 1);
  return makeCurve(
    own,
    (k) => Math.hypot(re[k]!, im[k]!) * unit,
    (k) => (strong(k) ? 0 : 3),
  );
}

/** Spectrum in dB over 1 V/m/Hz or 1 A/m/Hz, as recorded. */
export function spectrumCurve(run: SpectrumRun, probeId: string, name: string): Curve | null {
  const own = amplitudeAt(run, probeId, name);
  return own === null
    ? null
    : makeCurve(
        own,
        () => 1,
        () => 0,
      );
}

function makeCurve({ size, noise }: Amplitude, unit: (k: number) => number, cause: (k: number) => number): Curve {
  const n = size.length;
  const curve = { db: new Float64Array(n), floorDb: new Float64Array(n), cause: new Uint8Array(n) };
  for (let k = 0; k < n; k++) {
    curve.db[k] = decibels(size[k]! / unit(k));
    curve.floorDb[k] = decibels(noise[k]! / unit(k));
    curve.cause[k] = cause(k) || (size[k]! > noise[k]! ? 0 : 1);
  }
  return curve;
}

/** Insertion ratio of one probe as complex numbers, for files. */
export interface ProbeInsertion {
  readonly probeId: string;
  readonly components: readonly {
    readonly re: Float64Array;
    readonly im: Float64Array;
    /** 1 where the value is not known, for any cause. */
    readonly belowFloor: Uint8Array;
  }[];
}

/** H = F / F reference of every probe and component. */
export function makeInsertion(main: SpectrumRun, reference: SpectrumRun): ProbeInsertion[] {
  return main.spectra.flatMap(({ probeId, components }) => {
    const others = reference.spectra.find((one) => one.probeId === probeId)?.components;
    if (others === undefined) return [];
    return [
      {
        probeId,
        components: components.map((own, c) => {
          const other = others[c]!;
          const n = own.re.length;
          const ratio = { re: new Float64Array(n), im: new Float64Array(n) };
          for (let k = 0; k < n; k++) {
            const power = other.re[k]! ** 2 + other.im[k]! ** 2;
            ratio.re[k] = (own.re[k]! * other.re[k]! + own.im[k]! * other.im[k]!) / power;
            ratio.im[k] = (own.im[k]! * other.re[k]! - own.re[k]! * other.im[k]!) / power;
          }
          const curve = insertionCurve(main, reference, probeId, main.components[c]!)!;
          return { ...ratio, belowFloor: curve.cause.map((cause) => (cause === 0 ? 0 : 1)) };
        }),
      },
    ];
  });
}
