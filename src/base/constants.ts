// Owns the constants of nature the program computes with, in SI units.
// Must not know anything of the program.

/** Speed of light in vacuum, m/s. Exact (SI 2019). */
export const C0 = 299792458;
/** Magnetic constant, H/m. CODATA 2022: 1.25663706127(20)e-6. */
export const MU0 = 1.25663706127e-6;
/** Electric constant, F/m. From C0 and MU0, so that EPS0*MU0*C0^2 = 1 to rounding (CODATA 2022: 8.8541878188(14)e-12). */
export const EPS0 = 1 / (MU0 * C0 * C0);
/** Impedance of free space, ohm. From C0 and MU0 (CODATA 2022: 376.730313412(59)). */
export const ETA0 = MU0 * C0;
