import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/** Tests, and the commands they run, keep tables of grains in a folder of their own, which goes with them. */
export default function ownCache(): () => void {
  const folder = mkdtempSync(join(tmpdir(), 'motelight-cache-'))
  process.env.XDG_CACHE_HOME = folder
  return () => rmSync(folder, { recursive: true, force: true })
}
