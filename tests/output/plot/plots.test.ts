import { PNG } from 'pngjs'
import { describe, expect, it } from 'vitest'
import { meridianCells, meridianView } from '../../../src/output/plot/meridian.js'
import { spectrumPlot } from '../../../src/output/plot/spectrum-plot.js'
import type { DustStructure, MeridionalStructure } from '../../../src/output/plot/structure.js'
import { structurePlot } from '../../../src/output/plot/structure-plot.js'
import { exampleScene, exampleSpectrum } from '../examples.js'

const au = 1.495978707e13

/** How many pixels of a PNG are exactly of a colour. */
function pixelsOf(bytes: Uint8Array, colour: [number, number, number]): number {
  const { data } = PNG.sync.read(Buffer.from(bytes))
  let count = 0
  for (let i = 0; i < data.length; i += 4) if (colour.every((part, j) => data[i + j] === part)) count++
  return count
}

describe('spectrumPlot', () => {
  const wavelengths = Array.from({ length: 20 }, (_, k) => 1e-4 * 10 ** (k / 6))
  const flux = wavelengths.map((wavelength) => 1e-19 * wavelength)

  it('draws the total, its parts and error bars, the same every time', async () => {
    const first = await spectrumPlot(exampleSpectrum(wavelengths, flux), exampleScene())
    expect(await spectrumPlot(exampleSpectrum(wavelengths, flux), exampleScene())).toEqual(first)
    for (const text of ['Example source', 'wavelength (µm)', 'flux density Fν (Jy)', 'direct', 'scattered']) {
      expect(first.svg).toContain(text)
    }
    expect(first.svg.match(/aria-roledescription="rule mark"/g)).toHaveLength(wavelengths.length)
    // The lines of direct (#e69f00) and emitted (#c8402f) light lie over one another; the later one shows, the key shows both.
    expect(pixelsOf(first.png, [0x22, 0x22, 0x22])).toBeGreaterThan(500)
    expect(pixelsOf(first.png, [0xc8, 0x40, 0x2f])).toBeGreaterThan(500)
  })

  it('says so when nothing shines, and takes one wavelength and magnitudes', async () => {
    const dark = await spectrumPlot(
      exampleSpectrum(
        wavelengths,
        flux.map(() => 0)
      ),
      exampleScene()
    )
    expect(dark.svg).toContain('no light in this spectrum')
    const single = await spectrumPlot(exampleSpectrum([1e-4], [1e-20], 'mag'), exampleScene())
    expect(single.svg).toContain('AB magnitude (mag)')
    expect(single.svg).not.toContain('NaN')
  })
})

describe('values far out of the frame', () => {
  it.each(['Jy', 'mag'])('are left out of the picture without ending the program (%s)', async (unit) => {
    const steep = await spectrumPlot(exampleSpectrum([1e-4, 3e-4, 9e-4], [1e-69, 1e-34, 1e-200], unit), exampleScene())
    expect(pixelsOf(steep.png, [0x22, 0x22, 0x22])).toBeGreaterThan(20)
  })

  it('of the densities of two dusts, too', async () => {
    const r = Float64Array.of(1, 2, 3, 4).map((value) => value * au)
    const one = {
      name: 'thick',
      density: new Float64Array(4).fill(1),
      temperature: new Float64Array(4).fill(20),
      sigma: new Float64Array(4)
    }
    const components = [one, { ...one, name: 'thin', density: new Float64Array(4).fill(1e-60) }]
    expect((await structurePlot({ kind: 'radial', r, components }, 'Two dusts')).length).toBeGreaterThan(1000)
  })

  it('of a temperature that is the same but for rounding, too', async () => {
    const temperature = Float64Array.from({ length: 8 }, (_, i) => 30 * (1 + (i % 2) * 2 ** -52))
    const structure: MeridionalStructure = {
      kind: 'map',
      rWalls: new Float64Array([1, 2, 4].map((value) => value * au)),
      cosThetaWalls: new Float64Array([1, 0.5, 0, -0.5, -1]),
      components: [{ name: 'dust', density: new Float64Array(8).fill(1), temperature }]
    }
    expect((await structurePlot(structure, 'Even warmth')).length).toBeGreaterThan(1000)
  })
})

describe('structurePlot', () => {
  const structure: MeridionalStructure = {
    kind: 'map',
    rWalls: new Float64Array([1, 2, 4].map((r) => r * au)),
    cosThetaWalls: new Float64Array([1, 0.5, 0, -0.5, -1]),
    components: [
      { name: 'dust', density: new Float64Array([0, 1, 1, 0, 0, 1, 1, 0]), temperature: new Float64Array(8).fill(100) }
    ]
  }

  it('finds the cell of every pixel of a map', () => {
    const view = meridianView(structure, (cell) => structure.components[0].density[cell] > 0)
    // |cos theta| up to 0.5: z/R up to 1/sqrt(3).
    expect(view.height).toBeCloseTo(1 / Math.sqrt(3), 12)
    expect(view.outer).toBe(4 * au)
    const cells = meridianCells(structure, { inner: 1.5 * au, outer: 1.6 * au, height: 1 / Math.sqrt(3) }, 1, 4)
    // r = R sqrt(1 + (z/R)^2) stays between 1.5 and 1.9 au: always the inner cells, the upper half above the midplane.
    expect([...cells]).toEqual([1, 1, 2, 2])
    const falling = { ...structure, cosThetaWalls: structure.cosThetaWalls.map((cosine) => -cosine) }
    expect([...meridianCells(falling, { inner: 1.5 * au, outer: 1.6 * au, height: 0.5 }, 1, 4)]).toEqual([2, 2, 1, 1])
  })

  it('draws lines and maps, with components that do not emit, the same every time', async () => {
    const r = new Float64Array([1, 2, 3].map((value) => value * au))
    const emitting = {
      name: 'a',
      density: new Float64Array([3, 2, 1]),
      temperature: new Float64Array([300, 200, 100]),
      sigma: new Float64Array(3).fill(5)
    }
    const radial: DustStructure = {
      kind: 'radial',
      r,
      components: [emitting, { name: 'b', density: new Float64Array([0, 1, 1]) }]
    }
    const maps: DustStructure = {
      ...structure,
      components: [...structure.components, { name: 'dark', density: new Float64Array(8).fill(1) }]
    }
    for (const input of [radial, maps]) {
      const picture = await structurePlot(input, 'Example source')
      expect(await structurePlot(input, 'Example source')).toEqual(picture)
      expect(PNG.sync.read(Buffer.from(picture)).width).toBeGreaterThan(600)
    }
    const planes: DustStructure = {
      kind: 'planes',
      pixels: 40,
      components: [
        {
          name: 'dust',
          density: Float64Array.of(1, 1),
          half: 100 * au,
          planes: [{ axes: ['x', 'z'], cells: Int32Array.from({ length: 1600 }, (_, i) => (i % 40 < 20 ? 0 : 1)) }]
        }
      ]
    }
    // The edge between two cells of the top colour of viridis (#fde725) is darker by two fifths: 40 pixels of it, less two under the frame.
    const edge: [number, number, number] = [0x98, 0x8b, 0x16]
    expect(pixelsOf(await structurePlot(planes, 'x'), edge)).toBe(0)
    expect(pixelsOf(await structurePlot(planes, 'x', true), edge)).toBe(38)
    expect(pixelsOf(await structurePlot(radial, 'x'), [0x00, 0x72, 0xb2])).toBeGreaterThan(1000)
    // A uniform density takes the top colour of viridis (#fde725), over the whole of a 380 x 270 panel but its empty corners.
    expect(pixelsOf(await structurePlot(maps, 'x'), [0xfd, 0xe7, 0x25])).toBeGreaterThan(50_000)
  })
})
