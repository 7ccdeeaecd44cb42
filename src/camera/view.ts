import type { ViewSpec } from '../scene/types.js'

/** Unit vectors of a view in the frame of the scene. */
export interface ViewBasis {
  /** From the scene towards the observer. */
  observer: [number, number, number]
  /** To the right in the picture: west on the sky. */
  right: [number, number, number]
  /** Up in the picture: north on the sky. */
  up: [number, number, number]
}

/**
 * The frame of a view. The scene is turned by `azimuth` about its z axis (counter-clockwise seen from +z), then seen from the
 * inclination; with azimuth 0 the observer stands in the half-plane of x > 0. A positive roll turns the projected +z axis from
 * north towards east, which is counter-clockwise in a picture with north up and east to the left.
 */
export function viewBasis({ inclination, azimuth, roll }: ViewSpec): ViewBasis {
  const sinI = Math.sin(inclination)
  const cosI = Math.cos(inclination)
  const sinA = Math.sin(-azimuth)
  const cosA = Math.cos(-azimuth)
  const sinR = Math.sin(roll)
  const cosR = Math.cos(roll)
  const axis = [-cosI * cosA, -cosI * sinA, sinI]
  const across = [-sinA, cosA, 0]
  const combine = (a: number, b: number): [number, number, number] => [
    a * axis[0] + b * across[0],
    a * axis[1] + b * across[1],
    a * axis[2] + b * across[2]
  ]
  return { observer: [sinI * cosA, sinI * sinA, cosI], up: combine(cosR, sinR), right: combine(-sinR, cosR) }
}
