import { createHash } from 'node:crypto'
import { STOKES } from '../../src/camera/stokes-planes.js'
import type { RunResult } from '../../src/run/run-result.js'

/** A digest of every number that a user gets. */
export function digest({ dust, equilibrium, images, spectra, lightPackets }: RunResult): string {
  const hash = createHash('sha256')
  const add = (values: Float64Array) => hash.update(new Uint8Array(values.buffer, values.byteOffset, values.byteLength))
  add(dust.temperature)
  add(dust.sigma)
  if (equilibrium) hash.update(JSON.stringify([equilibrium.rounds, equilibrium.budget, equilibrium.packets, equilibrium.reached]))
  for (const product of [...images, ...spectra]) {
    for (const part of ['total', 'sigma', 'direct', 'emitted', 'scattered'] as const) add(product[part])
    for (const part of STOKES) if (product.stokes) add(product.stokes[part])
    add(Float64Array.from(product.samplingError))
    if ('column' in product && product.column) add(product.column.density)
  }
  for (const { packets, error } of lightPackets) add(Float64Array.of(packets, error))
  return hash.digest('hex')
}
