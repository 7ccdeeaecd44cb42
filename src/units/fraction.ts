import { numeral } from './numeral.js'

/** Regular expression of a percentage. */
export const percentagePattern = String.raw`^\s*(${numeral})\s*%\s*$`

const percentage = new RegExp(percentagePattern)

/** Reads a percentage such as `2 %` as 0.02; undefined for text that is none. */
export function parsePercentage(text: string): number | undefined {
  const match = percentage.exec(text)
  return match ? Number(match[1]) / 100 : undefined
}
