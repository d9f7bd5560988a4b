// Owns the continuous formulas of metal boxes and guides of rectangular section.
// Must not know the engine or its lattice.
// Source: D. M. Pozar, Microwave Engineering, 4th ed., sections 3.3 and 6.3; R. F. Harrington,
// Time-Harmonic Electromagnetic Fields, section 4-3.

/** Cutoff of TE10, Hz: c / 2a. */
export function guideCutoff(widthMetres: number, speed: number): number {
  return speed / (2 * widthMetres);
}

/** Decay below cutoff, Np/m: sqrt(kc^2 - k^2). */
export function guideAttenuation(widthMetres: number, speed: number, frequencyHertz: number): number {
  const kc = Math.PI / widthMetres;
  const k = (2 * Math.PI * frequencyHertz) / speed;
  if (k > kc) throw new RangeError(`${frequencyHertz} Hz is above cutoff: no decay to state.`);
  return Math.sqrt(kc * kc - k * k);
}

/** Resonance of a box a by b without variation along the third axis, Hz. */
export function boxResonance(aMetres: number, bMetres: number, m: number, n: number, speed: number): number {
  return (speed / 2) * Math.hypot(m / aMetres, n / bMetres);
}
