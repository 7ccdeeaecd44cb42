/** Text as it may stand in HTML, in elements and in quoted attributes. */
export function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`)
}

/** A table; cells are plain text. */
export function tableHtml(caption: string, columns: string[], rows: string[][]): string {
  const line = (cells: string[], tag: string) =>
    `<tr>${cells.map((cell) => `<${tag}>${escaped(cell)}</${tag.split(' ')[0]}>`).join('')}</tr>`
  const head = columns.length > 0 ? `<thead>${line(columns, 'th scope="col"')}</thead>` : ''
  const title = caption === '' ? '' : `<caption>${escaped(caption)}</caption>`
  return `<div class="scroll" tabindex="0" role="region" aria-label="${escaped(caption || 'table')}"><table>${title}${head}<tbody>${rows.map((row) => line(row, 'td')).join('')}</tbody></table></div>`
}

/** A value as JSON that may stand in a script element: nothing in it can end the element. */
export function jsonInScript(value: unknown): string {
  return JSON.stringify(value).replaceAll('<', '\\u003c')
}
