/** Steps of an even sequence modulo 1: the golden section (common practice). */
export const GOLDEN = 0.6180339887498949
/** The same for whole numbers modulo 2^32, and what turns them into shares of 1. */
export const GOLDEN_STEP = 0x9e3779b9
export const SHARE_OF_STEP = 2 ** -32
