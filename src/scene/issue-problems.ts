import type { z } from 'zod'
import { closest } from '../units/closest.js'
import type { SceneProblem } from './error.js'
import type { ScenePath } from './types.js'
import type { YamlDocument } from './yaml-document.js'

type Issue = z.core.$ZodIssue

/** The problems that issues of the schema stand for, located in the file. */
export function issueProblems(issues: readonly Issue[], document: YamlDocument): SceneProblem[] {
  return issues
    .filter((issue) => !isConsequence(issue, issues))
    .flatMap((issue) => explain(issue, []))
    .map(({ path, message }) => locateProblem(document, path, message))
}

/** A problem at a path of the scene file. */
export function locateProblem(document: YamlDocument, path: ScenePath, message: string): SceneProblem {
  const given = document.written(path)
  return { location: document.locate(path), key: path.join('.'), ...(given !== undefined && { given }), message }
}

/** A section with a misspelt key may seem incomplete because of that alone. */
function isConsequence(issue: Issue, issues: readonly Issue[]): boolean {
  const path = issue.path.join('.')
  return issue.code === 'custom' && issues.some((other) => other.code === 'unrecognized_keys' && other.path.join('.') === path)
}

interface Explanation {
  path: ScenePath
  message: string
}

function explain(issue: Issue, above: ScenePath): Explanation[] {
  const path = [...above, ...(issue.path as ScenePath)]
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({ path: [...path, key], message: unknownKey(key, issue.message) }))
    case 'invalid_key':
      return issue.issues.flatMap((inner) => explain(inner, path))
    case 'invalid_union': {
      const branch = chosenBranch(issue.errors)
      return branch ? branch.flatMap((inner) => explain(inner, path)) : [{ path, message: expected(issue) }]
    }
    default:
      return [{ path, message: expected(issue) }]
  }
}

function expected({ code, input, message }: Issue): string {
  return input === undefined && code !== 'custom' ? `the key is missing; ${message}` : message
}

/** `accepted` is the list of keys that `section` puts into the message. */
function unknownKey(key: string, accepted: string): string {
  const meant = closest(key, accepted.split(', '))
  return `unknown key; ${meant ? `did you mean \`${meant}\`? ` : ''}accepted here: ${accepted}`
}

/** Of several forms a value may take, the one it was meant to have: the right kind of value, with its keys present. */
function chosenBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] | undefined {
  const sameKind = branches.filter((issues) => !issues.some(isOtherKind))
  if (sameKind.length === 1) return sameKind[0]
  const complete = sameKind.filter((issues) => !issues.some(isMissingKey))
  return complete.length === 1 ? complete[0] : undefined
}

function isOtherKind(issue: Issue): boolean {
  if (issue.path.length > 0) return false
  if (issue.code === 'invalid_union') return chosenBranch(issue.errors) === undefined
  return issue.code === 'invalid_type' || issue.code === 'invalid_value' || issue.code === 'invalid_format'
}

function isMissingKey(issue: Issue): boolean {
  return issue.path.length === 1 && issue.code !== 'custom' && issue.input === undefined
}
