/**
 * When a root counts as on the stability boundary (the contract of the analysis): within this relative distance of it, or
 * when the coefficients, rounded to doubles, cannot tell it from a root on the boundary.
 */
export const BOUNDARY_DISTANCE = 1e-9

/** Backward error, in units of 2^-53, up to which rounded coefficients do not tell a root from one on the boundary. */
export const BACKWARD_ERROR_UNITS = 4
