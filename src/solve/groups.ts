/** Batches are dealt out to this many groups; the scatter between the groups' results gives every error. */
export const GROUPS = 16
