import { describe, expect, it } from 'vitest'
import { buildModel } from '../../src/model/build-model.js'
import { forecast } from '../../src/run/forecast.js'
import { TRIAL_PACKETS, TRIAL_PIXELS, type Trial } from '../../src/run/trial.js'
import { parseScene } from '../../src/scene/read.js'
import { sceneWith } from '../cli/motelight.js'

const trial: Trial = {
  dust: { packets: TRIAL_PACKETS.dust, seconds: 1, noise: 0.04 },
  light: { packets: 2 * TRIAL_PACKETS.light, seconds: 2, noise: 0.02 },
  pictures: { fixedSeconds: 0, seconds: 2, count: 2 },
  apertures: { seconds: 0, count: 2 },
  starlightSeconds: 0,
  precision: 0.05,
  complete: true
}
const effort = 'precision: none, equilibrium: 8000, cameras: 2000'
const modelWith = (asked: string) =>
  buildModel(parseScene(sceneWith([effort, asked], ['pixels: 8', `pixels: ${TRIAL_PIXELS}`]), 'scene.yaml'))

describe('forecast', () => {
  it('lets errors fall as the square root of the packets', () => {
    const { packets, seconds } = forecast(modelWith('precision: 1 %'), trial, 1)
    // (4 % / 1 %)^2 = 16 first rounds in the last round, as many again before it; (2 % / 1 %)^2 = 4 for scattered light.
    expect(packets.dust.needed).toBeCloseTo(32 * TRIAL_PACKETS.dust, 5)
    expect(packets.light.needed).toBeCloseTo(4 * TRIAL_PACKETS.light, 5)
    expect(seconds.dust).toBeCloseTo(32, 6)
    // Five wavelengths are observed.
    expect(seconds.light).toBeCloseTo(5 * 4, 6)
    expect(seconds.all).toBeCloseTo(seconds.dust + seconds.light + seconds.pictures, 9)
  })

  it('spends no more than is allowed, and exactly that when no precision is asked for', () => {
    for (const precision of ['0.1 %', 'none']) {
      const { seconds } = forecast(
        modelWith(`precision: ${precision}, equilibrium: ${2 * TRIAL_PACKETS.dust}, cameras: ${2 * TRIAL_PACKETS.light}`),
        trial,
        1
      )
      expect(seconds.dust).toBeCloseTo(2, 6)
      expect(seconds.light).toBeCloseTo(5 * 2, 6)
    }
  })

  it('shares the work among workers, and takes longer for more and for finer pixels', () => {
    const one = forecast(modelWith('precision: 1 %'), trial, 1)
    const two = forecast(modelWith('precision: 1 %'), trial, 2)
    expect(two.seconds.all).toBeCloseTo(one.seconds.all / 2, 6)
    const finer = forecast(modelWith('precision: 0.5 %'), trial, 1)
    expect(finer.seconds.pictures).toBeGreaterThan(one.seconds.pictures)
    // As exact as the trial: each of the two pictures, and that of the column density, takes the second that it took there.
    expect(forecast(modelWith('precision: 5 %'), trial, 1).seconds.pictures).toBeCloseTo(3, 6)
  })

  it('says when the trial was cut short, and then takes the most packets', () => {
    const cut = { ...trial, complete: false, dust: { packets: 1024, seconds: 8, noise: 0 } }
    const { complete, packets, seconds } = forecast(modelWith('precision: 1 %, equilibrium: 1e5'), cut, 1)
    expect(complete).toBe(false)
    expect(packets.dust.needed).toBeGreaterThanOrEqual(1e5)
    expect(seconds.dust).toBeCloseTo((1e5 * 8) / 1024, 3)
  })
})
