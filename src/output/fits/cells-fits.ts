import type { Scene } from '../../scene/types.js'
import { joined } from './hdu.js'
import { emptyPrimary } from './image.js'
import { originCards } from './origin-cards.js'
import { type FitsColumn, tableHdu } from './table.js'

/** The FITS file of the dust cells: one row a cell in the extension CELLS. Units of the columns in FITS notation (`AU`, `g cm-3`). */
export function cellsFits(columns: Omit<FitsColumn, 'repeat' | 'dimensions'>[], scene: Scene): Uint8Array {
  return joined([emptyPrimary(originCards(scene)), tableHdu('CELLS', columns)])
}
