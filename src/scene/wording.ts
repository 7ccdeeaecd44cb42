import type { z } from 'zod'
import { closest } from '../units/closest.js'

const kinds: Record<string, string> = {
  number: 'a number',
  int: 'a whole number',
  string: 'text',
  array: 'a list',
  tuple: 'a list',
  object: 'a section with keys',
  record: 'a section with keys'
}

/** What a value that the schema refuses should have been, where the schema itself does not say. */
export function wording(issue: z.core.$ZodRawIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return `${kinds[issue.expected] ?? issue.expected} is expected`
    case 'invalid_value':
      return acceptedValues(issue.values.map(String), issue.input)
    case 'invalid_union':
      return acceptedValues(optionsOf(issue), issue.input, issue.discriminator)
    case 'too_small':
      return `${issue.inclusive === false ? 'more than' : 'at least'} ${issue.minimum}${counted(issue.origin)} expected`
    case 'too_big':
      return `${issue.inclusive === false ? 'less than' : 'at most'} ${issue.maximum}${counted(issue.origin)} accepted`
    default:
      return 'not accepted here'
  }
}

function acceptedValues(accepted: string[], given: unknown, key?: string): string {
  const value = key === undefined ? given : (given as Record<string, unknown>)[key]
  const meant = typeof value === 'string' ? closest(value, accepted) : undefined
  return `${meant ? `did you mean \`${meant}\`? ` : ''}accepted: ${accepted.join(', ')}`
}

function counted(origin: string): string {
  if (origin === 'array') return ' in the list'
  return origin === 'string' ? ' letters' : ''
}

/** The kinds among which a discriminator chooses. */
function optionsOf({ options }: z.core.$ZodRawIssue): string[] {
  return Array.isArray(options) ? options.filter((option) => option !== undefined).map(String) : []
}
