import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { startProgress } from '../../src/cli/progress.js'
import type { RunProgress } from '../../src/run/progress.js'

const effort = { precision: 0.01, equilibrium: 1e6, cameras: 1e6, equilibriumAsked: true }
const dust = (done: number): RunProgress => ({ stage: 'dust', done, of: 32_768, round: 1, error: 0.02 })

/** Shows one step a second for `seconds`, and returns what was written. */
function written(isTTY: boolean, quiet: boolean, seconds: number): string {
  let text = ''
  const write = (part: string) => {
    text += part
    return true
  }
  const progress = startProgress({ write, isTTY, columns: 200 } as never, effort, quiet)
  for (let i = 0; i < seconds; i++) {
    progress.show(dust(1000 * i))
    vi.advanceTimersByTime(1000)
  }
  progress.clear()
  return text
}

describe('progress', () => {
  beforeEach(() => {
    vi.useFakeTimers({ toFake: ['performance'] })
  })
  afterEach(() => {
    vi.useRealTimers()
  })

  it('rewrites one line on a terminal and removes it', () => {
    const text = written(true, false, 6)
    expect(text).not.toContain('\n')
    expect(text.match(/\r/g)).toHaveLength(5)
    expect(text).toContain('dust temperatures, round 2: 15 % of 32768 packets, 1000 packets/s, error 2.0 %, about')
    expect(text.endsWith('\r\x1b[K')).toBe(true)
  })

  it('writes a line every five seconds elsewhere', () => {
    expect(written(false, false, 13).match(/packets\/s.*\n/g)).toHaveLength(3)
  })

  it('is silent for what is done in two seconds, and with --quiet', () => {
    expect(written(true, false, 2)).toBe('')
    expect(written(false, true, 20)).toBe('')
  })

  it('tells wavelength, camera and share of a picture', () => {
    let text = ''
    const sink = {
      write: (part: string) => {
        text += part
      },
      isTTY: false
    }
    const progress = startProgress(sink as never, effort, false)
    vi.advanceTimersByTime(3000)
    const at = { wavelength: 2.2e-4, index: 1, count: 4 }
    progress.show({
      stage: 'pictures',
      ...at,
      observer: { kind: 'camera', name: 'face' },
      done: 32,
      of: 64,
      round: 0,
      error: Number.NaN
    })
    expect(text).toBe('wavelength 2 of 4 (2.2 um), camera face: 50 %, about 5.3 s left\n')
  })
})
