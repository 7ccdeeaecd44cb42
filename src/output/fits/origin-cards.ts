import type { Scene } from '../../scene/types.js'
import { PARSEC } from '../../units/constants.js'
import { version } from '../version.js'
import { card, realCard } from './card.js'

/** What every file says of its origin: program, version, title and distance of the scene. */
export function originCards(scene: Pick<Scene, 'title' | 'distance'>): string[] {
  return [
    card('ORIGIN', 'motelight'),
    card('CREATOR', `motelight ${version}`, 'program and version'),
    card('OBJECT', scene.title),
    realCard('DIST_PC', scene.distance / PARSEC, '[pc] distance')
  ]
}
