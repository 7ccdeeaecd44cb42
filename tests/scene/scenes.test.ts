import { execFileSync } from 'node:child_process'
import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { buildModel } from '../../src/model/build-model.js'
import { parseScene, readScene } from '../../src/scene/read.js'
import { sceneYaml } from '../../src/scene/write.js'

const scenes = fileURLToPath(new URL('../../scenes/', import.meta.url))

describe('scenes to start from', () => {
  it.each(readdirSync(scenes).filter((file) => file.endsWith('.yaml')))(
    '%s is sound, resolved, and the same when written out',
    (file) => {
      const scene = readScene(`${scenes}${file}`)
      expect(buildModel(scene).warnings).toEqual([])
      const written = sceneYaml(scene)
      expect(sceneYaml(parseScene(written, `${scenes}written.yaml`))).toBe(written)
    }
  )

  it('the script beside the imported cube makes the same bytes', () => {
    const cube = `${scenes}data/cloud.fits`
    const before = readFileSync(cube)
    execFileSync('node', [`${scenes}data/make-cloud.mjs`])
    expect(readFileSync(cube).equals(before)).toBe(true)
  })
})
