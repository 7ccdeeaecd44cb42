import { chmodSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/**
 * All that tests, and the commands they run, leave behind goes into one folder, and goes with it: temporary folders, and the tables of
 * grains of a cache of its own.
 */
export default function ownFolder(): () => void {
  // Sockets have short names: so must the folder. Munge wants to know that everybody can reach them.
  const folder = mkdtempSync(join(tmpdir(), 'mote-'))
  chmodSync(folder, 0o755)
  process.env.TMPDIR = join(folder, 't')
  process.env.XDG_CACHE_HOME = join(folder, 'cache')
  mkdirSync(process.env.TMPDIR, { mode: 0o755 })
  return () => rmSync(folder, { recursive: true, force: true, maxRetries: 5 })
}
