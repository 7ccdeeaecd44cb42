import { MOST_BAND_ERROR } from './band.js'
import type { Observations } from './observe-run.js'
import type { CameraSource } from './run-source.js'

/** Fewest pixels of a run across a beam that resolve what the beam does. */
const FEWEST = 2
const MOST_EDGE = 0.02
const COARSE = 0.25

/** What is doubtful in observations. */
export function observationWarnings({ pictures, fluxes, visibilities }: Observations): string[] {
  return [
    ...pictures.flatMap(({ picture, source }) => {
      const { spec, grid, fineness, edge, bandError } = picture
      return [
        ...blankWarning(spec.name, source),
        ...when(
          fineness !== undefined && fineness < FEWEST,
          `${spec.name}: the beam is only ${short(fineness ?? 0)} pixels of the camera ${source.name} wide; with fewer than ${FEWEST} the picture is as blurred by the pixels as by the beam`
        ),
        ...when(
          Math.max(...grid.pixel) < 0.999 * Math.max(...source.pixel),
          `${spec.name}: its pixels are smaller than those of the camera ${source.name}; they hold no more detail`
        ),
        ...when(
          edge > MOST_EDGE,
          `${spec.name}: the picture is still bright at its edge (as much again would add ${percent(edge)} of the flux); light from outside the field of the camera is missing`
        ),
        ...bandWarning(spec.name, bandError)
      ]
    }),
    ...fluxes.flatMap(({ photometry: { spec, bandError } }) => bandWarning(spec.name, bandError)),
    ...visibilities.flatMap(({ measured: { spec, coarseness }, source }) => [
      ...blankWarning(spec.name, source),
      ...when(
        coarseness > COARSE,
        `${spec.name}: the longest baseline resolves ${short(1 / coarseness)} pixels of the camera ${source.name}; smaller pixels would be safer`
      )
    ])
  ]
}

function bandWarning(name: string, error: number): string[] {
  return when(
    error > MOST_BAND_ERROR,
    `${name}: the wavelengths of the run are too few for the band; interpolating between them costs about ${percent(error)}`
  )
}

function blankWarning(name: string, { name: camera, blanks }: CameraSource): string[] {
  return when(blanks > 0, `${name}: ${blanks} values of the camera ${camera} are no numbers and were taken as dark`)
}

function when(condition: boolean, text: string): string[] {
  return condition ? [text] : []
}

const short = (value: number) => String(Number(value.toPrecision(2)))
const percent = (value: number) => `${short(100 * value)} %`
