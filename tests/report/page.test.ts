import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Browser, Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect } from 'vitest'
import { ecsvNumbers, readEcsv } from '../../src/data/ecsv.js'
import { imageValues } from '../../src/data/fits/image.js'
import { readFits, unitNamed } from '../../src/data/fits/read.js'
import { motelight, sceneWith } from '../cli/motelight.js'
import { chromium, startChromium } from '../support/chromium.js'
import { folderWith } from '../support/folder-with.js'
import { itWith } from '../support/python.js'

const night = `title: A small mirror
observations:
  - {name: map, kind: picture, camera: face, wavelength: 60 um, beam: {kind: gaussian, major: 2 arcsec}, noise: {kind: rms, level: 0.1 Jy/beam, per: pixel}, unit: Jy/beam}
  - {name: sed-10, kind: photometry, spectrum: sed, wavelength: 10 um, noise: {kind: relative, level: 5 %}}
  - {name: pair, kind: visibilities, camera: face, wavelength: 60 um, baselines: [[1 m, 0 m], [0 m, 2 m]]}
`
const data = `title: What was seen
data:
  - {name: map, kind: picture, file: night/pictures/map.fits, camera: face, wavelength: 60 um, errors: {extension: NOISE}, free: [flux]}
  - {name: fluxes, kind: photometry, file: fluxes.csv, spectrum: sed}
`
const fluxes = 'wavelength [um], flux [Jy], sigma [Jy], limit\n60, 90, 20, 0\n10, 100, 20, 1\n'
const attack = '</script><script>document.title="taken"</script><img src=x onerror=alert(1)>'

let folder: string
let browser: Browser

beforeAll(async () => {
  if (!chromium.present) return
  const scene = sceneWith(['title: Small wind', `title: '${attack}'`], ['pixels: 8', 'pixels: 9'])
  folder = folderWith({ 'scene.yaml': scene, 'night.yaml': night, 'data.yaml': data, 'fluxes.csv': fluxes })
  const run = await motelight(folder, 'run', 'scene.yaml', '--out', 'run')
  expect(run.exitCode, run.stderr).toBe(0)
  const observe = await motelight(folder, 'observe', 'run', 'night.yaml', '--out', 'night')
  expect(observe.exitCode, observe.stderr).toBe(0)
  const compare = await motelight(folder, 'compare', 'run', 'data.yaml', '--out', 'compared')
  expect(compare.exitCode, compare.stderr).toBe(0)
  browser = await startChromium()
})

afterAll(() => browser?.close())

interface Options {
  width?: number
  scheme?: 'light' | 'dark'
}

/** Opens a report from the disk; anything that the page complains of or asks from elsewhere is in `complaints`. */
async function open(
  report: string,
  { width = 1280, scheme = 'light' }: Options = {}
): Promise<{ page: Page; complaints: string[] }> {
  const page = await browser.newPage({ viewport: { width, height: 1600 }, colorScheme: scheme })
  const complaints: string[] = []
  page.on('console', (message) => complaints.push(message.text()))
  page.on('pageerror', (error) => complaints.push(error.message))
  page.on('dialog', (dialog) => complaints.push(dialog.message()))
  page.on('request', (request) => {
    if (!/^(data:|file:.*\/report\.html$)/.test(request.url())) complaints.push(request.url())
  })
  await page.goto(`file://${join(folder, report, 'report.html')}`)
  await page.waitForSelector('canvas.sky')
  return { page, complaints }
}

const picture = '[data-picture="0"]'
const textOf = async (locator: Locator) => (await locator.textContent()) ?? ''
const readout = (page: Page) => textOf(page.locator(`${picture} .readout`))
/** Waits until the cursor is on pixel x, y, counted from 0. */
const shown = (page: Page, x: number, y: number) =>
  page.locator(`${picture} .readout`, { hasText: `pixel ${x + 1}, ${y + 1}` }).waitFor()

/** The number at the beginning of a text: `3.5`, `2.1×10⁻⁵`, `(3.5 ± 0.1)×10⁶`, as on the page. */
function numberAt(text: string): number {
  const [, mantissa, power = ''] = /^\(?([−\d.]+)(?: ± [\d.]+\))?(?:×10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+))?/.exec(text) ?? []
  const exponent = power.replace(/./g, (c) => (c === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(c))))
  return Number(`${mantissa.replace('−', '-')}e${exponent || 0}`)
}

/** The error in a text like that. */
function errorAt(text: string): number {
  const [, error, power] = /± ([\d.]+(?:×10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)?)\)?((?:×10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)?)/.exec(text)!
  return numberAt(error) * (power ? numberAt(`1${power}`) : 1)
}

const fits = (name = 'TOTAL', file = 'run/images/face.fits') => {
  const units = readFits(join(folder, file))
  return imageValues(name === 'TOTAL' ? units[0] : unitNamed(units, name))
}
// Six digits are shown of values, two of errors: half a unit of the last digit.
const asShown = (value: number) => Math.abs(value) * 5.1e-6
const errorAsShown = (value: number) => value * 0.051

/** Where pixel x, y (from 0, south-west) of 9 x 9 lies in the canvas. */
async function placeOf(page: Page, x: number, y: number): Promise<{ x: number; y: number }> {
  const box = (await page.locator(`${picture} canvas.sky`).boundingBox())!
  const side = box.width - 58 - 14
  return { x: box.x + 58 + ((x + 0.5) / 9) * side, y: box.y + 8 + ((8.5 - y) / 9) * side }
}

describe('the page of a run', () => {
  itWith(chromium, 'opens from the disk without complaints or requests, light and dark, on a laptop and a phone', async () => {
    for (const width of [1280, 390]) {
      for (const scheme of ['light', 'dark'] as const) {
        for (const report of ['run', 'night', 'compared']) {
          const { page, complaints } = await open(report, { width, scheme })
          expect(complaints).toEqual([])
          expect(await page.evaluate('document.documentElement.scrollWidth')).toBe(width)
          await page.close()
        }
      }
    }
  })

  itWith(chromium, 'takes text of scene files as text', async () => {
    const { page } = await open('run')
    expect(await textOf(page.locator('h1'))).toBe(attack)
    expect(await page.title()).toBe(attack)
    expect(await page.locator('main img[src=x]').count()).toBe(0)
    await page.locator('summary').first().click()
    expect(await textOf(page.locator('details pre').first())).toBe(readFileSync(join(folder, 'run/scene.yaml'), 'utf8'))
    await page.close()
  })

  itWith(chromium, 'shows the values of the FITS file, and their errors, under the pointer', async () => {
    const { page } = await open('run')
    const [total, sigma] = [fits(), fits('SIGMA')]
    for (const [k, x, y] of [
      [0, 2, 6],
      [0, 8, 0],
      [1, 5, 3]
    ]) {
      await page.locator(`${picture} input[type=range]`).first().fill(String(k))
      const place = await placeOf(page, x, y)
      await page.mouse.move(place.x, place.y)
      await shown(page, x, y)
      const text = await readout(page)
      const i = (k * 9 + y) * 9 + x
      expect(Math.abs(numberAt(text) - total[i])).toBeLessThanOrEqual(asShown(total[i]))
      expect(Math.abs(errorAt(text) - sigma[i])).toBeLessThanOrEqual(errorAsShown(sigma[i]))
      expect(text).toContain('MJy/sr')
    }
    await page.close()
  })

  itWith(chromium, 'converts to the unit that is chosen, and shows the light that is chosen', async () => {
    const { page } = await open('run')
    const [, unit] = [0, 1].map((i) => page.locator(`${picture} select`).nth(i))
    const middle = 4 * 9 + 4
    await unit.selectOption({ label: 'Jy/sr' })
    expect(Math.abs(numberAt(await readout(page)) / 1e6 - fits()[middle])).toBeLessThanOrEqual(asShown(fits()[middle]))
    await unit.selectOption({ label: 'mag/arcsec²' })
    // AB magnitudes: 0 mag is 3631 Jy (Oke & Gunn 1983, ApJ 266, 713); arcsec2 in sr: (pi/648000)^2.
    const magnitude = -2.5 * Math.log10((fits()[middle] * 1e6 * (Math.PI / 648000) ** 2) / 3631)
    expect(numberAt(await readout(page))).toBeCloseTo(magnitude, 3)
    await unit.selectOption({ label: 'MJy/sr' })
    await page.locator(`${picture} select`).first().selectOption({ label: 'scattered by dust' })
    expect(Math.abs(numberAt(await readout(page)) - fits('SCATTERED')[middle])).toBeLessThanOrEqual(
      asShown(fits('SCATTERED')[middle])
    )
    await page.close()
  })

  itWith(chromium, 'changes the picture with stretch, colours and limits', async () => {
    const { page } = await open('run')
    const image = () => page.evaluate<string>(`document.querySelector('canvas.sky').toDataURL()`)
    const seen = [await image()]
    for (const [i, label] of [
      [2, 'linear'],
      [2, 'square root'],
      [2, 'logarithmic'],
      [3, 'viridis'],
      [3, 'grey'],
      [3, 'grey, reversed']
    ] as const) {
      await page.locator(`${picture} select`).nth(i).selectOption({ label })
      seen.push(await image())
    }
    for (const i of [1, 2]) {
      await page.locator(`${picture} input[type=range]`).nth(i).fill('100')
      seen.push(await image())
    }
    // Logarithmic is what it began with.
    expect(new Set(seen).size).toBe(seen.length - 1)
    await page.close()
  })

  itWith(chromium, 'works with the keyboard alone: cursor, line and its profile, slider of wavelengths', async () => {
    const { page, complaints } = await open('run')
    await page.locator(`${picture} canvas.sky`).focus()
    for (const key of ['ArrowLeft', 'ArrowUp', 'ArrowUp']) await page.keyboard.press(key)
    await shown(page, 3, 6)
    const i = 6 * 9 + 3
    expect(Math.abs(numberAt(await readout(page)) - fits()[i])).toBeLessThanOrEqual(asShown(fits()[i]))
    await page.keyboard.press('Space')
    for (let step = 0; step < 3; step++) await page.keyboard.press('ArrowRight')
    await page.keyboard.press('Space')
    const legend = page.locator(`${picture} .legend`)
    await page.locator(`${picture} .chart`).focus()
    await page.keyboard.press('ArrowRight')
    await page.keyboard.press('ArrowRight')
    const second = (await textOf(legend)).split('value ')[1]
    expect(Math.abs(numberAt(second) - fits()[i + 2])).toBeLessThanOrEqual(asShown(fits()[i + 2]))
    await page.locator(`${picture} canvas.sky`).focus()
    await page.keyboard.press('Escape')
    expect(await legend.count()).toBe(0)
    await page.locator(`${picture} input[type=range]`).first().focus()
    await page.keyboard.press('ArrowRight')
    expect(await textOf(page.locator(`${picture} label output`).first())).toBe('60 µm')
    expect(complaints).toEqual([])
    await page.close()
  })

  itWith(chromium, 'draws a profile along a line that is dragged', async () => {
    const { page } = await open('run')
    const [from, to] = [await placeOf(page, 1, 1), await placeOf(page, 7, 7)]
    await page.mouse.move(from.x, from.y)
    await page.mouse.down()
    await page.mouse.move(to.x, to.y, { steps: 4 })
    await page.mouse.up()
    await page.locator(`${picture} .chart`).focus()
    await page.keyboard.press('End')
    const text = await textOf(page.locator(`${picture} .legend`))
    expect(Math.abs(numberAt(text.split('value ')[1]) - fits()[7 * 9 + 7])).toBeLessThanOrEqual(asShown(fits()[7 * 9 + 7]))
    await page.close()
  })

  itWith(chromium, 'shows a spectrum with its parts, in every unit, linear or logarithmic, and zooms', async () => {
    const { page, complaints } = await open('run')
    const chart = page.locator('[data-chart="0"]')
    const table = readEcsv(join(folder, 'run/spectra/sed.ecsv'))
    await chart.locator('.chart').focus()
    await page.keyboard.press('ArrowRight')
    const entries = (await chart.locator('.legend li').allInnerTexts()).map((text) => text.trim())
    expect(entries[0]).toBe('wavelength 10 µm')
    for (const [i, [label, column]] of [
      ['total', 'flux'],
      ['direct', 'direct'],
      ['emitted', 'emitted'],
      ['scattered', 'scattered']
    ].entries()) {
      const value = ecsvNumbers(table, column)[1]
      expect(entries[i + 1].startsWith(label)).toBe(true)
      expect(Math.abs(numberAt(entries[i + 1].slice(label.length + 1)) - value)).toBeLessThanOrEqual(asShown(value))
    }
    const image = () => page.evaluate<string>(`document.querySelector('[data-chart="0"] canvas').toDataURL()`)
    const seen = [await image()]
    await chart.getByLabel('logarithmic across').uncheck()
    seen.push(await image())
    await chart.getByLabel('logarithmic up').uncheck()
    seen.push(await image())
    await chart.getByRole('button', { name: 'zoom in' }).click()
    await page.waitForTimeout(50)
    seen.push(await image())
    for (const label of ['mJy', 'W/m²', 'mag']) {
      await chart.locator('select').selectOption({ label })
      seen.push(await image())
    }
    expect(new Set(seen).size).toBe(seen.length)
    expect(complaints).toEqual([])
    await page.close()
  })
})

describe('the page of an observation', () => {
  itWith(chromium, 'shows what was observed with the noise, and the fluxes', async () => {
    const { page } = await open('night')
    const file = 'night/pictures/map.fits'
    const [observed, noise] = [fits('TOTAL', file), fits('NOISE', file)]
    const text = await readout(page)
    expect(Math.abs(numberAt(text) - observed[40])).toBeLessThanOrEqual(asShown(observed[40]))
    expect(Math.abs(errorAt(text) - noise[40])).toBeLessThanOrEqual(errorAsShown(noise[40]))
    expect(text).toContain('Jy/beam (1 sigma, instrument)')
    const flux = ecsvNumbers(readEcsv(join(folder, 'night/photometry.ecsv')), 'flux')[0]
    const entry = await textOf(page.locator('[data-chart="0"] .legend li').nth(1))
    expect(Math.abs(numberAt(entry.trim().slice('observed '.length)) - flux)).toBeLessThanOrEqual(asShown(flux))
    await page.close()
  })
})

describe('the page of a comparison', () => {
  itWith(chromium, 'shows chi-squared and what was fitted as in its record, residuals, data and model', async () => {
    const { page, complaints } = await open('compared')
    const { sets, all, scalings } = JSON.parse(readFileSync(join(folder, 'compared/comparison.json'), 'utf8'))
    const cells = (heading: string) =>
      page
        .locator('section', { has: page.locator('h2', { hasText: heading }) })
        .locator('tbody td')
        .allInnerTexts()
    const agreement = await cells('Agreement')
    const [, value] = await cells('Fitted')
    for (const [i, { chiSquared, degreesOfFreedom }] of [...sets, all].entries()) {
      expect(agreement[4 * i + 1]).toBe(String(Number(chiSquared.toPrecision(5))))
      expect(agreement[4 * i + 2]).toBe(String(Number(degreesOfFreedom.toPrecision(5))))
    }
    expect(value).toBe(String(Number(scalings[0].value.toPrecision(5))))

    const units = readFits(join(folder, 'compared/sets/map.fits'))
    const middle = (name: string) => imageValues(unitNamed(units, name))[4 * 9 + 4]
    const residual = imageValues(units[0])[4 * 9 + 4]
    expect(Math.abs(numberAt(await readout(page)) - residual)).toBeLessThanOrEqual(asShown(residual))
    const second = page.locator('[data-picture="1"]')
    for (const [label, plane, sigma] of [
      ['data', 'DATA', 'SIGMA'],
      ['model', 'MODEL', 'MODELSIG']
    ]) {
      await second.locator('select').first().selectOption({ label })
      const text = await textOf(second.locator('.readout'))
      expect(Math.abs(numberAt(text) - middle(plane))).toBeLessThanOrEqual(asShown(middle(plane)))
      expect(Math.abs(errorAt(text) - middle(sigma))).toBeLessThanOrEqual(errorAsShown(middle(sigma)))
    }
    const table = readEcsv(join(folder, 'compared/sets/fluxes.ecsv'))
    const model = ecsvNumbers(table, 'model')[ecsvNumbers(table, 'wavelength').indexOf(10)]
    const entries = (await page.locator('[data-chart="0"] .legend li').allInnerTexts()).map((text) => text.trim())
    expect(entries[2]).toContain('upper limits 100 ')
    expect(Math.abs(numberAt(entries[3].slice('model '.length)) - model)).toBeLessThanOrEqual(asShown(model))
    expect(complaints).toEqual([])
    await page.close()
  })
})

describe('motelight report', () => {
  itWith(chromium, 'makes the same page again, lists it, and refuses what is neither', async () => {
    for (const report of ['run', 'night', 'compared']) {
      const file = join(folder, report, 'report.html')
      const before = readFileSync(file)
      const { exitCode, stdout } = await motelight(folder, 'report', report)
      expect([exitCode, stdout]).toEqual([0, `The report is ${report}/report.html`])
      expect(readFileSync(file).equals(before)).toBe(true)
    }
    expect(JSON.parse(readFileSync(join(folder, 'run/run.json'), 'utf8')).files).toContain('report.html')
    const { exitCode, stderr } = await motelight(folder, 'report', '.')
    expect([exitCode, stderr.trim()]).toEqual([2, '.: holds no run (there is no run.json in it)'])
  })
})
