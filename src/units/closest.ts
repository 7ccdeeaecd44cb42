/**
 * The word of a list nearest to one that is not in it, for "did you mean": by edit distance (Damerau-Levenshtein, adjacent
 * transpositions), case ignored; undefined when more than a third of the letters differ.
 */
export function closest(word: string, accepted: readonly string[]): string | undefined {
  let best: string | undefined
  let least = Math.max(1, Math.floor(word.length / 3)) + 1
  for (const candidate of accepted) {
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase())
    if (distance < least) {
      least = distance
      best = candidate
    }
  }
  return best
}

function editDistance(a: string, b: string): number {
  if (Math.abs(a.length - b.length) > 32) return Number.POSITIVE_INFINITY
  let beforeLast: number[] = []
  let last = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const row = [i]
    for (let j = 1; j <= b.length; j++) {
      const substituted = last[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1)
      row[j] = Math.min(last[j] + 1, row[j - 1] + 1, substituted)
      const transposed = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]
      if (transposed) row[j] = Math.min(row[j], beforeLast[j - 2] + 1)
    }
    beforeLast = last
    last = row
  }
  return last[b.length]
}
