// Owns what the uniform two-dimensional Yee lattice does exactly: wavenumbers, box resonances, decay below cutoff.
// Must not know the engine.
// Source: A. Taflove and S. C. Hagness, Computational Electrodynamics, 3rd ed., chapter 4 (numerical dispersion),
//   [sin(w dt/2)/(c dt)]^2 = [sin(kx dx/2)/dx]^2 + [sin(ky dy/2)/dy]^2.

export interface YeeLattice {
  readonly dxMetres: number;
  readonly dyMetres: number;
  readonly dtSeconds: number;
  /** Wave speed of the medium, m/s. */
  readonly speed: number;
}

function temporal(lattice: YeeLattice, omega: number): number {
  return (Math.sin((omega * lattice.dtSeconds) / 2) / (lattice.speed * lattice.dtSeconds)) ** 2;
}

function spatial(k: number, spacing: number): number {
  return (Math.sin((k * spacing) / 2) / spacing) ** 2;
}

/** Angular frequency of the lattice wave (kx, ky), rad/s. */
export function yeeFrequency(lattice: YeeLattice, kx: number, ky: number): number {
  const sum = spatial(kx, lattice.dxMetres) + spatial(ky, lattice.dyMetres);
  return (2 / lattice.dtSeconds) * Math.asin(lattice.speed * lattice.dtSeconds * Math.sqrt(sum));
}

/** Wavenumber of the lattice wave travelling at an angle (from +x), rad/m, by Newton's method from the continuous one. */
export function yeeWavenumber(lattice: YeeLattice, omega: number, angleRadians: number): number {
  const cx = Math.cos(angleRadians);
  const cy = Math.sin(angleRadians);
  const { dxMetres: dx, dyMetres: dy } = lattice;
  const wanted = temporal(lattice, omega);
  let k = omega / lattice.speed;
  for (let turn = 0; turn < 50; turn++) {
    const excess = spatial(k * cx, dx) + spatial(k * cy, dy) - wanted;
    const slope = (cx * Math.sin(k * cx * dx)) / (2 * dx) + (cy * Math.sin(k * cy * dy)) / (2 * dy);
    const change = excess / slope;
    k -= change;
    if (Math.abs(change) < 1e-15 * k) return k;
  }
  return k;
}

/** Decay along x, Np/m, of a lattice wave with transverse wavenumber ky below its cutoff. */
export function yeeAttenuation(lattice: YeeLattice, omega: number, ky: number): number {
  const excess = spatial(ky, lattice.dyMetres) - temporal(lattice, omega);
  if (excess < 0) throw new RangeError(`The wave runs freely at ${omega} rad/s: no decay to state.`);
  return (2 / lattice.dxMetres) * Math.asinh(lattice.dxMetres * Math.sqrt(excess));
}
