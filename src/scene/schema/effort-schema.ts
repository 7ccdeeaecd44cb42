import { z } from 'zod'
import type { EffortSpec } from '../types.js'
import { count, real, section } from './fields.js'

const mostPackets = 1e12
const packets = count(1, mostPackets)

/** `effort`. */
export const effortSchema = section({
  precision: z
    .union([z.literal('none'), real({ above: 0, below: 1 })], {
      error: () => 'a percentage such as `1 %`, or `none`, is expected'
    })
    .prefault('1 %')
    .describe('Relative 1 sigma to reach, default 1 %; `none` spends exactly the packets given'),
  equilibrium: packets.optional().describe('Most photon packets for the dust temperatures, default 4e6'),
  cameras: packets.prefault(1e6).describe('Most photon packets for each wavelength of cameras and spectra, default 1e6')
}).transform(
  ({ precision, equilibrium, cameras }): EffortSpec => ({
    precision: precision === 'none' ? null : precision,
    equilibrium: equilibrium ?? 4e6,
    cameras,
    equilibriumAsked: equilibrium !== undefined
  })
)
