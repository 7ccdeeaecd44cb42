import { expect, it } from 'vitest'
import { cosAzimuth } from '../../src/math/cos-azimuth.js'

it('cosAzimuth is the cosine of the library and stays within 1', () => {
  let worst = 0
  let most = 0
  for (let i = 0; i <= 10_000; i++) {
    const cosine = cosAzimuth(i / 10_000)
    worst = Math.max(worst, Math.abs(cosine + Math.cos((Math.PI * i) / 10_000)))
    most = Math.max(most, Math.abs(cosine))
  }
  expect(worst).toBeLessThan(3e-11)
  expect(most).toBeLessThanOrEqual(1)
})
