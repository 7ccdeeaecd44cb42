import { readFileSync } from 'node:fs'

/** The program's version, as its package declares it. */
export const version: string = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')).version
