import type { Tools } from './case.js'
import { lightDust } from './lit-dust.js'
import { PacketPool } from './packet-pool.js'
import { shellScene } from './scenes.js'
import type { Times } from './times.js'
import { Twin } from './twin.js'

/** A fixed piece of work, by which times of different machines and hours can be compared. */
export interface Yardstick {
  measure: () => Promise<Times> | Times
  close: () => Promise<void>
}

const PACKETS = 400_000

/** The packet loop of a shell of optical depth 1: in C, or where there is no compiler the program's own. */
export async function openYardstick({ native, folder }: Tools): Promise<Yardstick> {
  const dust = lightDust(shellScene({ depth: 1, packets: PACKETS }))
  if (native) {
    const twin = new Twin(native, folder, dust)
    return { measure: () => twin.play(PACKETS, 'yardstick'), close: async () => {} }
  }
  const pool = new PacketPool(dust.medium)
  await pool.warmUp(PACKETS)
  return { measure: () => pool.play(PACKETS, 'yardstick'), close: () => pool.close() }
}
