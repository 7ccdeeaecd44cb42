/** Text broken at spaces into lines of at most `most` characters; a longer word stays whole. */
export function wrapped(text: string, most: number): string[] {
  const lines = ['']
  for (const word of text.split(/\s+/)) {
    const longer = `${lines[lines.length - 1]} ${word}`.trim()
    if (longer.length <= most) lines[lines.length - 1] = longer
    else lines.push(word)
  }
  return lines.filter((line) => line !== '')
}
