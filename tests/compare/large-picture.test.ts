import { expect, it } from 'vitest'
import { residualPng } from '../../src/compare/picture-files.js'
import { profilePlot } from '../../src/compare/profile-plot.js'
import { inPlace, type ShownPicture } from '../../src/compare/sets/compared-set.js'
import { pictureSet } from '../../src/compare/sets/picture-set.js'
import { lopsided, pictureData } from './measured.js'

/** More pixels than a function takes as arguments. */
const SIDE = 450

it('a picture of many pixels has its plots', { timeout: 60_000 }, async () => {
  const source = lopsided()
  const layout = { width: SIDE, height: SIDE, side: 6 / SIDE }
  const never = (_: string, message: string): never => {
    throw new Error(message)
  }
  const set = pictureSet(pictureData(layout, new Float64Array(SIDE * SIDE)), source, source.light, never)
  const shown = set.shown as ShownPicture
  const model = set.model(inPlace)
  expect(residualPng(set, shown, model, 'Large').length).toBeGreaterThan(1000)
  expect((await profilePlot(set, shown, model, inPlace, 'Large')).length).toBeGreaterThan(1000)
})
