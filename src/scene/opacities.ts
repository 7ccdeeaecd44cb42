import type { z } from 'zod'
import type { DataFiles } from './data-files.js'
import { phaseLaw } from './phase-law.js'
import type { WrittenConstants, WrittenPart } from './schema/constants-schema.js'
import type { opacitySchema } from './schema/opacity-schema.js'
import { parseConstantsTable, parseOpacityTable, parseSizesTable } from './tables.js'
import type { ConstantsSpec, GrainPopulation, MixturePart, OpacitySpec, ScenePath, SizesSpec } from './types.js'

type WrittenOpacity = z.output<typeof opacitySchema>
type WrittenPopulation = Extract<WrittenOpacity, { law: 'grains' }>['populations'][number]

/** An entry of `opacities` with the files that it names; undefined, and problems in `files`, when one cannot be used. */
export function opacitySpec(entry: WrittenOpacity, name: string, files: DataFiles): OpacitySpec | undefined {
  const path = ['opacities', name]
  const phase = phaseLaw(entry.phase, [...path, 'phase'], files)
  switch (entry.law) {
    case 'table': {
      const table = files.read(entry.file, [...path, 'file'], parseOpacityTable)
      return table && phase && { law: 'table', table, phase }
    }
    case 'grains': {
      const { law, populations, inline } = entry
      const read = populations.map((population, i) =>
        grainPopulation(population, inline ? path : [...path, 'populations', i], files)
      )
      return phase && whole(read) ? { law, populations: read, phase } : undefined
    }
    default:
      return phase && { ...entry, phase }
  }
}

function grainPopulation(written: WrittenPopulation, path: ScenePath, files: DataFiles): GrainPopulation | undefined {
  const { coat, constants: core, sizes: radii, ...rest } = written
  const constants = constantsSpec(core, [...path, 'constants'], files)
  const sizes = sizesSpec(radii, path, files)
  const coatConstants = coat && constantsSpec(coat.constants, [...path, 'coat', 'constants'], files)
  if (!constants || !sizes || (coat && !coatConstants)) return undefined
  return { ...rest, constants, sizes, ...(coat && coatConstants && { coat: { ...coat, constants: coatConstants } }) }
}

function sizesSpec(written: WrittenPopulation['sizes'], path: ScenePath, files: DataFiles): SizesSpec | undefined {
  if (written.kind !== 'table') return written
  const table = files.read(written.file, [...path, 'sizes', 'file'], parseSizesTable)
  return table && { kind: 'table', ...table }
}

function constantsSpec(written: WrittenConstants, path: ScenePath, files: DataFiles): ConstantsSpec | undefined {
  switch (written.kind) {
    case 'table': {
      const table = files.read(written.file, path, parseConstantsTable)
      return table && { kind: 'table', table }
    }
    case 'bruggeman': {
      const parts = mixtureParts(written.parts, [...path, 'bruggeman'], files)
      return parts && { kind: 'bruggeman', parts }
    }
    case 'maxwell-garnett': {
      const inner = [...path, 'maxwell-garnett']
      const matrix = constantsSpec(written.matrix, [...inner, 'matrix'], files)
      const inclusions = mixtureParts(written.inclusions, [...inner, 'inclusions'], files)
      return matrix && inclusions && { kind: 'maxwell-garnett', matrix, inclusions }
    }
    default:
      return written
  }
}

function mixtureParts(written: WrittenPart[], path: ScenePath, files: DataFiles): MixturePart[] | undefined {
  const parts = written.map(({ constants, volumeFraction }, i) => {
    const read = constantsSpec(constants, [...path, i, 'constants'], files)
    return read && { constants: read, volumeFraction }
  })
  return whole(parts) ? parts : undefined
}

function whole<Item>(items: (Item | undefined)[]): items is Item[] {
  return items.every((item) => item !== undefined)
}
