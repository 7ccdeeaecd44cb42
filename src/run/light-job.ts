import type { GroupSums } from '../solve/group-sums.js'
import type { RoundsRequest } from '../solve/rounds.js'
import type { Studio } from './observe-wavelength.js'

/** The work at one wavelength: packets, and what is made of them. */
export interface LightJob {
  /** Absent where no packet is needed. */
  request?: RoundsRequest
  /** Writes everything wanted at the wavelength; false when it was stopped before the end. */
  develop: (sums: GroupSums | undefined, studio: Studio) => Promise<boolean>
}
