/** A value of a header card; a complex number or an undefined value is not kept. */
export type HeaderValue = string | number | boolean

/** The cards of one header: values by keyword (the first where one is repeated), and the texts of COMMENT cards. */
export class FitsHeader {
  private readonly values = new Map<string, HeaderValue>()
  readonly comments: string[] = []

  /** `cards`: 80 characters each, without END (FITS Standard 4.0, section 4; long strings by CONTINUE, section 4.2.1.2). */
  constructor(cards: string[]) {
    let last: string | undefined
    for (const card of cards) {
      const keyword = card.slice(0, 8).trimEnd()
      if (keyword === 'COMMENT') this.comments.push(card.slice(8).trim())
      if (keyword === 'CONTINUE' && last !== undefined) {
        const before = this.values.get(last)
        const more = parseValue(card.slice(8))
        if (typeof before === 'string' && before.endsWith('&') && typeof more === 'string')
          this.values.set(last, before.slice(0, -1) + more)
        continue
      }
      if (card.slice(8, 10) !== '= ') continue
      const value = parseValue(card.slice(10))
      last = value === undefined || this.values.has(keyword) ? undefined : keyword
      if (last !== undefined) this.values.set(keyword, value!)
    }
  }

  has(keyword: string): boolean {
    return this.values.has(keyword)
  }

  /** The value of a keyword if it is a number. */
  number(keyword: string): number | undefined {
    const value = this.values.get(keyword)
    return typeof value === 'number' ? value : undefined
  }

  /** The value of a keyword if it is text, without the spaces at its end. */
  text(keyword: string): string | undefined {
    const value = this.values.get(keyword)
    return typeof value === 'string' ? value.trimEnd() : undefined
  }
}

const textValue = /^\s*'((?:[^']|'')*)'/
const numberValue = /^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[EeDd][+-]?\d+)?)\s*(?:\/|$)/

function parseValue(field: string): HeaderValue | undefined {
  const text = textValue.exec(field)
  if (text) return text[1].replaceAll("''", "'").trimEnd()
  const number = numberValue.exec(field)
  if (number) return Number(number[1].replace(/[Dd]/, 'E'))
  const word = field.split('/')[0].trim()
  return word === 'T' ? true : word === 'F' ? false : undefined
}
