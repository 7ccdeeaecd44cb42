import { stream } from '../math/random.js'
import { spreadPoint } from '../math/spread-points.js'
import type { ClumpsSpec } from '../scene/types.js'
import type { Details, FreeShape, Shape } from './shape.js'
import { onSphere } from './shell.js'
import { SphereTree } from './sphere-tree.js'

/** Points in all clumps together, and fewest in one, that find how much of the mass they hold. */
const SAMPLES = 200_000
const FEWEST = 8
/** Draws for one clump until its centre is where there is dust. */
const MOST_DRAWS = 1000

/**
 * A shape in which the density is `contrast` times larger within spheres than between them, its mass kept. Centres are drawn at
 * random from the mass; where spheres overlap the contrast is that of one.
 */
export function clumps(shape: Shape, { count, radius, contrast, seed }: ClumpsSpec): FreeShape {
  const { relativeDensity, totalMass, place, counts } = shape
  const uniform = stream(`clumps/${seed}`)
  const [x, y, z] = [new Float64Array(count), new Float64Array(count), new Float64Array(count)]
  const p = new Float64Array(3)
  const dusty = () => relativeDensity(p[0], p[1], p[2]) > 0 && (!counts || uniform() < counts(p[0], p[1], p[2]))
  for (let i = 0; i < count; i++) {
    let draws = 0
    do place(uniform(), uniform(), uniform(), p)
    while (!dusty() && ++draws < MOST_DRAWS)
    x[i] = p[0]
    y[i] = p[1]
    z[i] = p[2]
  }
  const radii = new Float64Array(count).fill(radius)
  const tree = new SphereTree(x, y, z, radii)
  const none = new Int32Array(0)

  // A point in so many spheres counts for each of them in part.
  const samples = Math.max(FEWEST, Math.ceil(SAMPLES / count))
  const volume = (4 / 3) * Math.PI * radius ** 3
  let inside = 0
  for (let i = 0; i < count; i++) {
    for (let n = 0; n < samples; n++) {
      spreadPoint(n, p)
      onSphere(radius * Math.cbrt(p[0]), p[1], 2 * p[2] - 1, p)
      const [px, py, pz] = [x[i] + p[0], y[i] + p[1], z[i] + p[2]]
      const density = relativeDensity(px, py, pz)
      if (density > 0) inside += (density * volume) / samples / Math.max(1, tree.find(px, py, pz, none))
    }
  }
  const between = totalMass / (totalMass + (contrast - 1) * inside)
  return {
    ...shape,
    symmetry: 'none',
    relativeDensity: (px, py, pz) => {
      const density = relativeDensity(px, py, pz)
      return density > 0 ? density * (tree.find(px, py, pz, none) > 0 ? contrast * between : between) : 0
    },
    sphereEdges: shape.symmetry === 'axial' ? [...shape.sphereEdges, ...shape.cylinderEdges] : shape.sphereEdges,
    details: together(shape.details, { x, y, z, radius: radii })
  }
}

function together(a: Details, b: Details): Details {
  const join = (key: keyof Details) => {
    const all = new Float64Array(a[key].length + b[key].length)
    all.set(a[key])
    all.set(b[key], a[key].length)
    return all
  }
  return { x: join('x'), y: join('y'), z: join('z'), radius: join('radius') }
}
