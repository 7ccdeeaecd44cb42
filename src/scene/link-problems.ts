import { closest } from '../units/closest.js'
import type { SceneProblem } from './error.js'
import { isRecord } from './is-record.js'
import { locateProblem } from './issue-problems.js'
import type { ScenePath } from './types.js'
import type { YamlDocument } from './yaml-document.js'

/**
 * What is wrong between the parts of a scene: names given twice or nowhere, nothing that shines, nothing asked for. Works on
 * the file as written, so that it sees parts that are unsound in themselves too.
 */
export function linkProblems(document: YamlDocument): SceneProblem[] {
  const scene = document.value
  if (!isRecord(scene)) return []
  const problems: SceneProblem[] = []
  const report = (path: ScenePath, message: string) => problems.push(locateProblem(document, path, message))

  for (const section of ['sources', 'dust', 'cameras', 'spectra']) {
    const seen = new Set<string>()
    entriesOf(scene[section]).forEach(({ name }, i) => {
      if (typeof name !== 'string') return
      // Names of dust become names of columns, where the three signs are one.
      const plain = section === 'dust' ? name.toLowerCase().replace(/[._-]/g, '_') : name.toLowerCase()
      const more = section === 'dust' ? 'capitals and . _ -' : 'capitals'
      if (seen.has(plain))
        report([section, i, 'name'], `the name is used twice in this list; names must differ in more than ${more}`)
      seen.add(plain)
    })
  }

  const dust = entriesOf(scene.dust)
  const known = isRecord(scene.opacities) ? Object.keys(scene.opacities) : []
  dust.forEach(({ opacity }, i) => {
    if (typeof opacity !== 'string' || known.includes(opacity)) return
    const meant = closest(opacity, known)
    const hint = meant ? `did you mean \`${meant}\`? ` : ''
    report(['dust', i, 'opacity'], `no such entry of \`opacities\`; ${hint}there are: ${known.join(', ') || 'none'}`)
  })

  const stars = entriesOf(scene.sources).filter(({ kind = 'star' }) => kind === 'star')
  dust.forEach(({ shape, sublimation, temperature = 'solve' }, i) => {
    if (sublimation !== undefined && temperature !== 'solve')
      report(['dust', i, 'sublimation'], 'dust can sublimate only with `temperature: solve`')
    if (sublimation !== undefined && isRecord(shape) && isRecord(shape.inner))
      report(['dust', i, 'sublimation'], 'goes round in a circle with `inner: {temperature: ...}`; give one of the two')
    if (!isRecord(shape) || !isRecord(shape.inner)) return
    if (temperature !== 'solve')
      report(['dust', i, 'shape', 'inner'], 'an inner radius follows from a temperature only in dust with `temperature: solve`')
    else if (stars.length === 0)
      report(['dust', i, 'shape', 'inner'], 'an inner radius follows from a temperature only about a star; give a length')
  })

  const glows = dust.some(({ temperature = 'solve' }) => temperature !== 'solve' && temperature !== 'none')
  if (entriesOf(scene.sources).length === 0 && !glows)
    report([], 'nothing shines: give at least one source, or dust with a fixed temperature')
  const asksTemperatures = isRecord(scene.effort) && Object.hasOwn(scene.effort, 'equilibrium')
  if (entriesOf(scene.cameras).length === 0 && entriesOf(scene.spectra).length === 0 && !asksTemperatures)
    report([], 'nothing is asked for: give at least one camera, one spectrum or `effort.equilibrium`')
  return problems
}

function entriesOf(list: unknown): Record<string, unknown>[] {
  return Array.isArray(list) ? list.map((entry) => (isRecord(entry) ? entry : {})) : []
}
