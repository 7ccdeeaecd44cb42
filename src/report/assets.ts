import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'

const require = createRequire(import.meta.url)

/** Scripts of the page, in the order they need each other; plain scripts that share one scope. */
const parts = ['values', 'scale', 'paint', 'chart', 'profile', 'picture', 'main']

/** The script of the page and the style of its charts. */
export function pageAssets(): { script: string; chartStyle: string } {
  const read = (name: string) => readFileSync(require.resolve(name), 'utf8')
  const own = parts.map((name) =>
    readFileSync(new URL(`./page/${name}.js`, import.meta.url), 'utf8').replace(/^\/\/# sourceMappingURL.*$/m, '')
  )
  const script = `${read('uplot/dist/uPlot.iife.min.js')}\n;(() => {\n'use strict'\n${own.join('\n')}\n})()\n`
  return { script, chartStyle: read('uplot/dist/uPlot.min.css') }
}

/** The source of an inline element in a content-security policy (CSP Level 3, section 2.3.1). */
export function hashSource(text: string): string {
  return `'sha256-${createHash('sha256').update(text).digest('base64')}'`
}
