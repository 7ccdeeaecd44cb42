import { shellWord } from '../../output/shell-word.js'

/** The script of a job: Slurm starts it for each task, and it turns into the command. */
export function taskScript(command: string[], lines: string[]): string {
  return ['#!/bin/sh', ...lines, `exec ${command.map(shellWord).join(' ')}`, ''].join('\n')
}
