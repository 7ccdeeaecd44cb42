/**
 * The walls of spherical cells. The cell inside r[1] is the core: it is not divided in angle and has index 0.
 * The others have index 1 + ((ir - 1) * nt + it) * np + ip. Beyond r[nr] there is nothing.
 */
export interface SphericalWalls {
  /** nr + 1 radii, cm; r[0] = 0. */
  r: Float64Array
  /** nt + 1 cosines of the polar angle, from 1 down to -1. */
  cosTheta: Float64Array
  /** np + 1 azimuths, rad, from 0 to 2 pi. */
  phi: Float64Array
}

export function cellCount(walls: SphericalWalls): number {
  return 1 + (walls.r.length - 2) * (walls.cosTheta.length - 1) * (walls.phi.length - 1)
}

/** Volume of every cell, cm3, into `out`. */
export function cellVolumes(walls: SphericalWalls, out: Float64Array): Float64Array {
  const { r, cosTheta, phi } = walls
  const nr = r.length - 1
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  out[0] = (4 / 3) * Math.PI * r[1] ** 3
  let cell = 1
  for (let ir = 1; ir < nr; ir++) {
    const a = r[ir]
    const b = r[ir + 1]
    const shell = ((b - a) * (a * a + a * b + b * b)) / 3
    for (let it = 0; it < nt; it++) {
      const wedge = shell * (cosTheta[it] - cosTheta[it + 1])
      for (let ip = 0; ip < np; ip++) out[cell++] = wedge * (phi[ip + 1] - phi[ip])
    }
  }
  return out
}
