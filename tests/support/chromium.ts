import { type Browser, chromium as driver } from 'playwright-core'
import { outsideTool } from './python.js'

const executable = '/usr/bin/chromium'

export const chromium = outsideTool('chromium', executable, ['--version'])

/** A browser without a window that asks nobody for anything. */
export function startChromium(): Promise<Browser> {
  return driver.launch({
    executablePath: executable,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync'
    ]
  })
}
