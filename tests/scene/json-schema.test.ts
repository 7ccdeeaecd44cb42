import { describe, expect, test } from 'vitest'
import { sceneJsonSchema } from '../../src/scene/json-schema.js'

interface Schema {
  description?: string
  pattern?: string
  properties?: Record<string, Schema>
  items?: Schema
  oneOf?: Schema[]
  anyOf?: Schema[]
  enum?: string[]
  const?: string
  required?: string[]
  additionalProperties?: boolean | Schema
}

const schema = sceneJsonSchema() as unknown as Schema & { $schema: string }

/** Every schema below one, with the path of its keys. */
function* walk(node: Schema, path = ''): Generator<[string, Schema]> {
  yield [path, node]
  for (const [key, child] of Object.entries(node.properties ?? {})) yield* walk(child, `${path}.${key}`)
  for (const child of [...(node.oneOf ?? []), ...(node.anyOf ?? [])]) yield* walk(child, path)
  if (node.items) yield* walk(node.items, path)
  if (typeof node.additionalProperties === 'object') yield* walk(node.additionalProperties, path)
}

describe('sceneJsonSchema', () => {
  test('is of draft 2020-12, plain JSON, closed to unknown keys', () => {
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema')
    expect(JSON.parse(JSON.stringify(schema))).toEqual(schema)
    expect(schema.additionalProperties).toBe(false)
    expect(schema.required).toEqual(['distance'])
    expect(Object.keys(schema.properties!)).toEqual([
      'title',
      'distance',
      'sky',
      'seed',
      'sources',
      'opacities',
      'dust',
      'grid',
      'effort',
      'cameras',
      'spectra'
    ])
  })

  test('every key of the file has a description', () => {
    for (const [key, child] of Object.entries(schema.properties!)) expect(child.description, key).toBeTruthy()
  })

  test('offers every kind and law', () => {
    const constants = new Set([...walk(schema)].map(([, node]) => node.const))
    for (const word of [
      'star',
      'ambient',
      'power',
      'table',
      'grains',
      'extinction-curve',
      'shell',
      'disk',
      'ring',
      'infall',
      'ball',
      'slab',
      'field',
      'auto',
      'spherical',
      'octree'
    ])
      expect(constants).toContain(word)
    const units = [...walk(schema)].filter(([path]) => path === '.cameras.unit').map(([, node]) => node.enum)
    expect(units[0]).toContain('MJy/sr')
    expect(units[0]).not.toContain('Jy/beam')
  })

  test('patterns of quantities accept units and refuse bare numbers', () => {
    const pattern = new RegExp(schema.properties!.distance.pattern!)
    for (const text of ['320 pc', '3.2e2pc', '1 kpc']) expect(text).toMatch(pattern)
    for (const text of ['320', '320 K', 'pc', '320 pcs']) expect(text).not.toMatch(pattern)
    const wavelengths = [...walk(schema)].filter(([path, node]) => path === '.cameras.wavelengths' && node.pattern)
    for (const text of ['1 um', '1 \u00b5m', '1 micron', '1 \u00c5', '230 GHz'])
      expect(text).toMatch(new RegExp(wavelengths[0][1].pattern!))
  })
})
