/** Constants of nature, SI. Source: CODATA 2018; check value M-01. */

/** Speed of light, m/s; exact by definition of the metre. */
export const SPEED_OF_LIGHT = 299792458;
/** Magnetic constant, H/m. */
export const MU_0 = 1.25663706212e-6;
/** Electric constant, F/m. */
export const EPSILON_0 = 1 / (MU_0 * SPEED_OF_LIGHT * SPEED_OF_LIGHT);
/** Impedance of free space, ohm. */
export const ETA_0 = MU_0 * SPEED_OF_LIGHT;
/** Decibels in a neper, 20/ln 10. Check value T-29. */
export const DB_PER_NEPER = 20 / Math.LN10;
