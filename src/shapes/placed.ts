import type { ShapeSpec, Vector } from '../scene/types.js'
import { edgeRadii, type FreeShape, type Point, type Shape } from './shape.js'

/** A shape tipped about the origin and then moved there; itself when that changes nothing. */
export function placed(shape: Shape, tilt: ShapeSpec['tilt'], at: Vector = [0, 0, 0]): Shape {
  const distance = Math.hypot(...at)
  const tipped = tilt !== undefined && tilt.angle !== 0 && shape.symmetry !== 'spherical'
  if (!tipped && distance === 0) return shape
  const axes = tipped ? tippedAxes(tilt) : upright
  const { relativeDensity, place, counts, details, line, innerRadius: inner, outerRadius: outer } = shape
  const own = (f: (x: number, y: number, z: number) => number) => {
    const [[xx, xy, xz], [yx, yy, yz], [zx, zy, zz]] = axes
    const [ax, ay, az] = at
    return (x: number, y: number, z: number) => {
      const [dx, dy, dz] = [x - ax, y - ay, z - az]
      return f(xx * dx + xy * dy + xz * dz, yx * dx + yy * dy + yz * dz, zx * dx + zy * dy + zz * dz)
    }
  }
  const outward = ([x, y, z]: Point): [number, number, number] => {
    const component = (k: number) => at[k] + x * axes[0][k] + y * axes[1][k] + z * axes[2][k]
    return [component(0), component(1), component(2)]
  }
  const centres = Array.from(details.x, (x, i) => outward([x, details.y[i], details.z[i]]))
  const moved: FreeShape = {
    symmetry: 'none',
    relativeDensity: own(relativeDensity),
    totalMass: shape.totalMass,
    column: shape.column,
    line: { from: outward(line.from), to: outward(line.to) },
    innerRadius: distance > outer ? distance - outer : Math.max(0, inner - distance),
    outerRadius: distance + outer,
    halfSide: Math.max(...at.map(Math.abs)) + (tipped ? outer : (shape.halfSide ?? outer)),
    sphereEdges: edgeRadii(shape)
      .flatMap((r) => (distance > 0 ? [Math.abs(distance - r), distance + r] : [r]))
      .filter((r) => r > 0),
    place: (u, v, w, out) => {
      place(u, v, w, out)
      out.set(outward([out[0], out[1], out[2]]))
    },
    ...(counts && { counts: own(counts) }),
    details: {
      x: centres.map(([x]) => x),
      y: centres.map(([, y]) => y),
      z: centres.map(([, , z]) => z),
      radius: details.radius
    }
  }
  return moved
}

const upright: Point[] = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1]
]

/** Where the axes of a shape point when its z axis leans by `angle` towards the azimuth `toward`: a turn about a line of the plane z = 0. */
function tippedAxes({ angle, toward }: NonNullable<ShapeSpec['tilt']>): Point[] {
  const [sinA, cosA, sinT, cosT] = [Math.sin(angle), Math.cos(angle), Math.sin(toward), Math.cos(toward)]
  const less = 1 - cosA
  return [
    [1 - less * cosT * cosT, -less * cosT * sinT, -sinA * cosT],
    [-less * cosT * sinT, 1 - less * sinT * sinT, -sinA * sinT],
    [sinA * cosT, sinA * sinT, cosA]
  ]
}
