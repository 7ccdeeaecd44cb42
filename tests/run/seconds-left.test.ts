import { expect, it } from 'vitest'
import { secondsLeft } from '../../src/run/seconds-left.js'

const effort = { precision: 0.01, equilibrium: 1e7, cameras: 1e6, equilibriumAsked: true }
const dust = { stage: 'dust', done: 8192, of: 32_768, round: 1 } as const

it('dust: the rest of the round when the error will then be small enough', () => {
  // Twice the packets of the round before bring 1.4 % to below 1 %.
  expect(secondsLeft({ ...dust, error: 0.014 }, 1000, 10, effort)).toBeCloseTo((32_768 - 8192) / 1000)
})

it('dust: further rounds, each twice as large, until one is large enough, and no more than allowed', () => {
  // 4 % after 16384 packets: 1 % needs 16 times as many, 262144, which is the round after the round after the next.
  const rest = 32_768 - 8192
  expect(secondsLeft({ ...dust, error: 0.04 }, 1000, 10, effort)).toBeCloseTo((rest + 65_536 + 131_072 + 262_144) / 1000)
  const spent = 16_384 + 32_768
  expect(secondsLeft({ ...dust, error: 0.04 }, 1000, 10, { ...effort, equilibrium: 1e5 })).toBeCloseTo(
    (rest + 1e5 - spent) / 1000
  )
})

it('wavelengths: as long as those done so far', () => {
  const at = { wavelength: 1e-4, index: 3, count: 4, done: 1, of: 2, round: 0, error: Number.NaN }
  expect(secondsLeft({ stage: 'light', ...at }, 1, 65, effort)).toBeCloseTo(65 * (4 / 3.25 - 1), 9)
  expect(secondsLeft({ stage: 'pictures', ...at, done: 2 }, 1, 78, effort)).toBeCloseTo(78 * (4 / 3.9 - 1), 9)
})

it('nothing is said before anything is known', () => {
  expect(secondsLeft({ ...dust, error: Number.NaN }, 0, 0, effort)).toBeUndefined()
  expect(secondsLeft({ ...dust, stage: 'light', done: 0, error: Number.NaN }, 0, 5, effort)).toBeUndefined()
})
