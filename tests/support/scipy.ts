import { spawnSync } from 'node:child_process'
import type { OutsideTool } from './python.js'

/** SciPy, for integrals and special functions of its own. */
export const scipy: OutsideTool = {
  present: spawnSync('/usr/bin/python3', ['-c', 'import scipy']).status === 0,
  debianPackage: 'python3-scipy'
}
