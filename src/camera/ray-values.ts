import { GROUPS } from '../solve/groups.js'

/** Values of a ray: emitted, scattered, the Stokes parameters Q, U and V, then the deviations of the groups from the intensity. */
export const EMITTED = 0
export const SCATTERED = 1
export const Q = 2
export const FIRST_GROUP = 5
export const RAY_VALUES = FIRST_GROUP + GROUPS
/** With polarisation: the groups' deviations from Q, U and V as well. */
export const POLARISED_VALUES = RAY_VALUES + 3 * GROUPS
