import { expect, it } from 'vitest'
import { style } from '../../src/report/style.js'

/** The colours of both schemes, light first, by name. */
const schemes = [...style.matchAll(/:root \{([^}]*)\}/g)].map(
  ([, body]) => new Map([...body.matchAll(/--(\w+): (#[0-9a-f]{6})/g)].map(([, name, colour]) => [name, colour]))
)

/** Relative luminance and contrast ratio: WCAG 2.2, https://www.w3.org/TR/WCAG22/#dfn-relative-luminance and #dfn-contrast-ratio. */
function luminance(colour: string): number {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(colour.slice(at, at + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4))
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}

function contrast(a: string, b: string): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y)
  return (high + 0.05) / (low + 0.05)
}

it('the measure of contrast is that of the standard', () => {
  expect(contrast('#000000', '#ffffff')).toBe(21)
  // The lightest grey that passes AA on white (common practice).
  expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2)
})

it('text has a contrast of 4.5 on every ground, curves and borders of controls 3: WCAG 2.2 AA, 1.4.3 and 1.4.11', () => {
  expect(schemes).toHaveLength(2)
  for (const scheme of schemes) {
    const colour = (name: string) => scheme.get(name)!
    for (const ground of ['ground', 'panel', 'alert']) {
      for (const ink of ['ink', 'quiet', 'accent'])
        expect(contrast(colour(ink), colour(ground)), `${ink} on ${ground}`).toBeGreaterThan(4.5)
    }
    for (const mark of ['s0', 's1', 's2', 's3', 's4', 's5', 'edge'])
      expect(contrast(colour(mark), colour('ground')), mark).toBeGreaterThan(3)
  }
})
