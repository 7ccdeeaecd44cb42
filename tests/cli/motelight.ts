import { readdirSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { execa } from 'execa'

export const program = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url))

/** A small scene, one key a line; a run takes about a second. */
export const sceneText = `title: Small wind
distance: 300 pc
seed: first
sources:
  - name: giant
    temperature: 3000 K
    luminosity: 5000 Lsun
opacities:
  soot:
    law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}
dust:
  - name: wind
    opacity: soot
    shape: {kind: shell, inner: 10 au, outer: 1000 au, slope: -2}
    amount: {optical-depth: 1.5, at: 0.55 um}
grid: {kind: spherical, radial: 20}
effort: {precision: none, equilibrium: 8000, cameras: 2000}
cameras:
  - name: face
    field: 2000 au
    pixels: 8
    wavelengths: [2.2 um, 60 um]
spectra:
  - name: sed
    wavelengths: [1 um, 10 um, 100 um]
`

/** The scene with pieces of its text replaced; each must be there. */
export function sceneWith(...changes: [string, string][]): string {
  return changes.reduce((text, [from, to]) => {
    if (!text.includes(from)) throw new Error(`the scene does not hold ${from}`)
    return text.replace(from, to)
  }, sceneText)
}

/** Every file below a folder, sorted. */
export function filesIn(folder: string): string[] {
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name).slice(folder.length + 1))
    .sort()
}

/** Runs the program in a folder as a user would; never throws for an exit code. */
export function motelight(cwd: string, ...words: string[]) {
  return execa('node', [program, ...words], { cwd, reject: false, env: { MOTELIGHT_DEBUG: '' } })
}
