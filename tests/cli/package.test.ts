import { cpSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { execa } from 'execa'
import { expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, sceneText } from './motelight.js'

const root = fileURLToPath(new URL('../..', import.meta.url))

it('npm pack, installed into an empty folder, gives a working command and library', async () => {
  const folder = folderWith({ 'package.json': '{"private": true, "type": "module"}', 'scene.yaml': sceneText })
  // Packed from the build under test: --ignore-scripts keeps npm from building again under the feet of other tests.
  const pack = await execa('npm', ['pack', '--json', '--ignore-scripts', '--pack-destination', folder], { cwd: root })
  const [{ filename, files }] = JSON.parse(pack.stdout)
  const packed = files.map(({ path }: { path: string }) => path)
  expect(packed).toEqual(
    expect.arrayContaining(['LICENSE', 'dist/cli/main.js', 'dist/index.js', 'dist/index.d.ts', 'dist/run/thread.js'])
  )
  expect(packed.filter((path: string) => /^(src|tests|out|node_modules)\//.test(path))).toEqual([])

  await execa('npm', ['install', '--prefer-offline', '--no-audit', '--no-fund', `./${filename}`], { cwd: folder })
  const { stdout, exitCode } = await execa('npx', ['motelight', 'run', 'scene.yaml', '--quiet'], { cwd: folder })
  expect(exitCode).toBe(0)
  expect(stdout).toContain('Results are in out/scene')
  expect(filesIn(join(folder, 'out/scene'))).toContain('run.json')

  cpSync(join(folder, 'scene.yaml'), join(folder, 'again.yaml'))
  const script = `import { buildModel, readScene } from 'motelight'; console.log(buildModel(readScene('again.yaml')).cells)`
  expect((await execa('node', ['--input-type=module', '-e', script], { cwd: folder })).stdout).toBe('20')
})
