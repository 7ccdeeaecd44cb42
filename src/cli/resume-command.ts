import { shellWord } from '../output/shell-word.js'

/** The command line that goes on with what the given words began. */
export function resumeCommand(words: string[]): string {
  const kept = words.filter((word) => !['--force', '--force=true', '--resume', '--resume=true'].includes(word))
  const resumed = kept[0] === 'run' ? [...kept, '--resume'] : kept
  return ['motelight', ...resumed].map(shellWord).join(' ')
}
