import { isRecord } from '../../scene/is-record.js'
import type { ScenePath } from '../../scene/types.js'
import { closest } from '../../units/closest.js'

/**
 * Follows a dotted path such as `dust.wind.amount.optical-depth` through a scene as written; entries of a list go by their `name`
 * or their place, counted from 0. The last keys may be missing from the scene (their defaults are), its entries may not.
 */
export function resolvePath(path: string, scene: unknown): ScenePath | { problem: string } {
  return follow(path, scene, [])
}

function follow(rest: string, value: unknown, done: ScenePath): ScenePath | { problem: string } {
  if (rest === '') return done
  const where = done.length > 0 ? `\`${done.join('.')}\`` : 'the scene'
  if (Array.isArray(value)) {
    const names = value.map((entry) => (isRecord(entry) && typeof entry.name === 'string' ? entry.name : undefined))
    const index = value.findIndex((_, i) => begins(rest, names[i]) || begins(rest, String(i)))
    if (index >= 0)
      return follow(after(rest, begins(rest, names[index]) ? names[index]! : String(index)), value[index], [...done, index])
    const known = names.filter((name) => name !== undefined)
    const word = rest.split('.')[0]
    const meant = closest(word, known)
    const hint = meant ? `did you mean \`${meant}\`? ` : ''
    return { problem: `unknown path: ${where} has no entry \`${word}\`; ${hint}there are: ${known.join(', ') || 'none'}` }
  }
  if (isRecord(value)) {
    const key = Object.keys(value).find((candidate) => begins(rest, candidate))
    return key === undefined ? [...done, ...rest.split('.')] : follow(after(rest, key), value[key], [...done, key])
  }
  return { problem: `unknown path: ${where} is a value, there is nothing below it` }
}

function begins(path: string, word: string | undefined): boolean {
  return word !== undefined && (path === word || path.startsWith(`${word}.`))
}

function after(path: string, word: string): string {
  return path.slice(word.length + 1)
}
