/** Unit of Stokes parameters beside an intensity or flux: the same, or a linear one beside magnitudes, as they may be negative. */
export function stokesUnit(unit: string): string {
  if (!unit.startsWith('mag')) return unit
  return unit.includes('/') ? 'MJy/sr' : 'Jy'
}
