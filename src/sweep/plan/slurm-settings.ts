import { wording } from '../../scene/wording.js'
import { closest } from '../../units/closest.js'
import { type SlurmSettings, slurmSchema } from './plan-schema.js'

/** Settings of a plan with words such as `time=30` of a command line in their place. */
export function readSlurmSettings(settings: SlurmSettings, words: string[]): SlurmSettings | { problem: string } {
  const keys = Object.keys(slurmSchema.unwrap().shape).filter((key) => key !== 'lines')
  const given: Record<string, string | number> = {}
  for (const word of words) {
    const [, key, value] = /^([a-z-]+)=(.+)$/s.exec(word) ?? []
    if (key === undefined) return { problem: `${word}: a word such as \`partition=long\` is expected` }
    if (!keys.includes(key)) {
      const meant = closest(key, keys)
      return { problem: `${key}: ${meant ? `did you mean \`${meant}\`? ` : ''}accepted: ${keys.join(', ')}` }
    }
    given[key] = /^\d+$/.test(value) ? Number(value) : value
  }
  const result = slurmSchema.safeParse({ ...settings, ...given }, { error: wording })
  if (result.success) return result.data
  const [{ path, message }] = result.error.issues
  return { problem: `${path.join('.')}: ${message}` }
}
