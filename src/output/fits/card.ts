const width = 80
const longestText = 68

/** A value that a FITS header card can hold; a whole number is written as an integer. */
export type CardValue = string | number | boolean

/**
 * One header card of 80 ASCII characters in fixed format (FITS Standard 4.0, section 4.2): strings begin in column 11,
 * other values end in column 30 where they fit. Text is reduced to ASCII and cut to what one card holds.
 */
export function card(keyword: string, value: CardValue, comment = ''): string {
  const written = typeof value === 'string' ? quoted(value) : literal(value).padStart(20)
  const head = `${keyword.padEnd(8)}= ${written.padEnd(20)}`
  return (comment === '' ? head : `${head} / ${ascii(comment)}`).padEnd(width).slice(0, width)
}

/** A real-valued card: the value keeps its decimal point even when whole. */
export function realCard(keyword: string, value: number, comment = ''): string {
  const head = `${keyword.padEnd(8)}= ${real(value).padStart(20)}`
  return (comment === '' ? head : `${head} / ${ascii(comment)}`).padEnd(width).slice(0, width)
}

/** A COMMENT card. */
export function commentCard(text: string): string {
  return `COMMENT ${ascii(text)}`.padEnd(width).slice(0, width)
}

/** Text as printable ASCII: accents are dropped, other characters become a question mark. */
export function ascii(text: string): string {
  return text
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/\s+/g, ' ')
    .replace(/[^ -~]/gu, '?')
    .trim()
}

function quoted(text: string): string {
  let body = ascii(text).replaceAll("'", "''")
  if (body.length > longestText) {
    body = body.slice(0, longestText)
    const quotesAtEnd = /'*$/.exec(body)![0].length
    if (quotesAtEnd % 2 === 1) body = body.slice(0, -1)
  }
  return `'${body.padEnd(8)}'`
}

function literal(value: number | boolean): string {
  if (typeof value === 'boolean') return value ? 'T' : 'F'
  return Number.isSafeInteger(value) ? String(value) : real(value)
}

/** Shortest decimal that reads back as the same double, always with a decimal point. */
function real(value: number): string {
  const [mantissa, exponent] = String(value).toUpperCase().split('E')
  const point = mantissa.includes('.') ? mantissa : `${mantissa}.0`
  return exponent === undefined ? point : `${point}E${exponent}`
}
