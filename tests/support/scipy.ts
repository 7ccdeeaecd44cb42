import { outsideTool } from './python.js'

/** SciPy, for integrals and special functions of its own. */
export const scipy = outsideTool('python3-scipy', '/usr/bin/python3', ['-c', 'import scipy'])
