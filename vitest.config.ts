import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

const dist = fileURLToPath(new URL('./dist/', import.meta.url))

// Tests import `../src/...` and run the compiled `dist/...`: workers start from `dist`, and hot loops keep their full speed there.
export default defineConfig({
  resolve: { alias: [{ find: /^(?:\.\.\/)+src\/(.*)$/, replacement: `${dist}$1` }] },
  test: {
    include: ['tests/**/*.test.ts'],
    globalSetup: ['tests/setup/build.ts', 'tests/setup/own-folder.ts'],
    server: { deps: { external: [/\/dist\//] } },
    execArgv: ['--enable-source-maps'],
    testTimeout: 300_000,
    hookTimeout: 120_000,
    maxWorkers: 2
  }
})
