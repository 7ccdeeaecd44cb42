import { z } from 'zod'
import { mostSobolDimensions } from '../../math/sobol.js'
import { count, dataFile, real, section, text } from '../../scene/schema/fields.js'

/** Most models of one sweep. */
export const mostModels = 1_000_000

const scalar = z.union([z.number(), z.string()], { error: () => 'a number, a number with its unit, or text is expected' })

const range = section({
  from: scalar.describe('First value, with the unit that the scene wants there'),
  to: scalar.describe('Last value, in the same unit'),
  count: count(2, 100_000).optional().describe('Number of values; only for `design: grid`'),
  spacing: z.enum(['linear', 'log']).prefault('linear').describe('`linear` (default) or `log`')
})

const values = z
  .union([z.array(scalar).min(1).max(100_000), range], {
    error: () => 'a list such as [2600 K, 2900 K], or {from: 0.1, to: 10, count: 12, spacing: log} is expected'
  })
  .describe('A list of values, or {from, to, count, spacing}')

const tie = section({
  to: z.string().describe('Path of the value that this one follows'),
  times: real({}).optional().describe('This value is so many times the other, in the same unit'),
  power: real({ from: -20, to: 20 })
    .optional()
    .describe('Instead of `times`: this value changes from that of the base scene as this power of the other; default 1')
}).refine(({ times, power }) => times === undefined || power === undefined, {
  path: ['power'],
  error: () => 'give `times` or `power`, not both'
})

const points = count(1, mostModels)
const design = z
  .union(
    [
      z.literal('grid'),
      section({ 'latin-hypercube': points.describe('Number of models') }),
      section({ sobol: points.describe('Number of models, best a power of 2') }),
      section({ table: dataFile.describe('CSV: a column for each path, with its unit in the header; a row for each model') })
    ],
    { error: () => '`grid`, {latin-hypercube: 200}, {sobol: 256} or {table: models.csv} is expected' }
  )
  .prefault('grid')
  .describe(
    `Which models: every combination (\`grid\`, default), a Latin hypercube, a scrambled Sobol sequence (at most ${mostSobolDimensions} axes), or a table`
  )

const data = z
  .union([dataFile, z.array(z.unknown()).min(1).max(1000)], {
    error: () => 'a file of data, or a list such as [{name: old, file: fluxes.csv, spectrum: sed}], is expected'
  })
  .describe('A file of data (see `motelight schema data`), or a list of its entries; those without `kind` are of photometry')

export const slurmSchema = section({
  partition: text.optional().describe('Partition'),
  account: text.optional().describe('Account'),
  time: text.optional().describe('Longest time of a task, as Slurm writes it, such as `30` (minutes) or `2:00:00`'),
  memory: text.optional().describe('Memory of a task, as Slurm writes it, such as `2G`'),
  cores: count(1, 512).prefault(1).describe('Cores of a task, default 1'),
  'at-once': count(1, 1_000_000).optional().describe('Most tasks that may run at once'),
  'models-a-task': count(1, 100_000).optional().describe('Models that a task makes one after the other'),
  parts: count(1, 100_000)
    .optional()
    .describe('Parts that every model is cut into, one a task, for large models with `precision: none`'),
  lines: z
    .array(z.string().regex(/^#SBATCH [^\n\r]+$/, { error: () => 'a line such as `#SBATCH --constraint=fast` is expected' }))
    .prefault([])
    .describe('More `#SBATCH` lines')
}).prefault({})

/** A plan file. */
export const planSchema = section({
  title: text.optional().describe('Free text'),
  scene: dataFile.describe('Scene file that the models are made from, relative to the folder of the plan'),
  seed: text.optional().describe('Seed of the design and of the models; default: that of the scene'),
  vary: z.record(z.string(), values).prefault({}).describe('Paths into the scene, such as `dust.wind.amount.optical-depth`'),
  tied: z.record(z.string(), tie).prefault({}).describe('Values that follow those that vary'),
  design,
  precision: z
    .union([z.literal('none'), real({ above: 0, below: 1 })], {
      error: () => 'a percentage such as `2 %`, or `none`, is expected'
    })
    .optional()
    .describe('Precision of every model, instead of `effort.precision` of the scene'),
  data: data.optional(),
  observe: dataFile
    .optional()
    .describe('Instrument file (see `motelight schema instrument`): every model is observed with it, with noise of its own'),
  slurm: slurmSchema.describe('How to ask Slurm')
})

export type WrittenPlan = z.output<typeof planSchema>
export type WrittenValues = z.output<typeof values>
export type SlurmSettings = WrittenPlan['slurm']
