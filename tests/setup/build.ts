import { execFileSync } from 'node:child_process'
import { rmSync } from 'node:fs'

/** Empties and builds `dist` once before any test, so that tests run what a user runs. */
export default function build(): void {
  rmSync('dist', { recursive: true, force: true })
  execFileSync('npm', ['run', '--silent', 'build'], { stdio: 'inherit' })
}
