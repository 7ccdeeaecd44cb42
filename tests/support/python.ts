import { spawnSync } from 'node:child_process'
import { it } from 'vitest'

const interpreter = '/usr/bin/python3'

/** A program outside this project that a test needs, and the Debian package that brings it. */
export interface OutsideTool {
  command: string
  present: boolean
  debianPackage: string
}

export const astropy = outsideTool('python3-astropy', interpreter, ['-c', 'import astropy'])
export const fitsverify = outsideTool('fitsverify', 'fitsverify', [])

/**
 * `it` for tests that need a tool: skipped, saying how to install it, when the tool is missing; with CI=true a missing tool
 * is a failure.
 */
export function itWith(tool: OutsideTool, name: string, test: () => void | Promise<void>): void {
  const advice = `apt-get install ${tool.debianPackage}`
  if (tool.present) it(name, test)
  else if (process.env.CI === 'true') {
    it(name, () => {
      throw new Error(`missing: ${advice}`)
    })
  } else it.skip(`${name} (needs: ${advice})`, test)
}

/** Runs a Python script with `input` on its standard input and returns what it prints; throws when it fails. */
export function runPython(script: string, input = ''): string {
  const { status, stdout, stderr } = spawnSync(interpreter, ['-c', script], { input, encoding: 'utf8' })
  if (status !== 0) throw new Error(`python: ${stderr}`)
  return stdout
}

/** Runs a Python script that finds JSON as `data` and puts its answer into `answer`; returns that answer. */
export function askPython<Answer>(script: string, data: unknown): Answer {
  const program = `import json, sys, warnings\ndata = json.load(sys.stdin)\n${script}\njson.dump(answer, sys.stdout)\n`
  return JSON.parse(runPython(program, JSON.stringify(data))) as Answer
}

/** Whether a program answers, and what brings it. */
export function outsideTool(debianPackage: string, command: string, args: string[]): OutsideTool {
  const { error, status } = spawnSync(command, args)
  return { command, present: !error && (command !== interpreter || status === 0), debianPackage }
}
