/** What a run is doing, for whoever shows it. */
export interface RunProgress {
  stage: 'grains' | 'dust' | 'starlight' | 'light' | 'pictures' | 'columns'
  /** Wavelength at hand, cm, and how many of how many; absent for the dust. */
  wavelength?: number
  index?: number
  count?: number
  /** The camera or spectrum at hand, for pictures. */
  observer?: { kind: 'camera' | 'spectrum'; name: string }
  /** The opacity whose grains are at hand. */
  opacity?: string
  /** Packets (or rows of pixels, wavelengths of grains, cells on whose way to the stars columns are found) done and asked for in the present round. */
  done: number
  of: number
  round: number
  /** Relative 1 sigma after the round before; NaN before the first. */
  error: number
}

/** The user stopped the run before its end. */
export class Stopped extends Error {
  override name = 'Stopped'
}
