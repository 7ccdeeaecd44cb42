/**
 * Temperatures and scattered light each may make this share of the error asked for, so that together, added in squares, they
 * reach it.
 */
export const SHARE = Math.SQRT1_2
