import { existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { observedWavelengths } from '../model/wavelengths.js'
import type { Scene } from '../scene/types.js'
import { divide } from '../solve/batches.js'
import { joinShares, type Share } from '../solve/share.js'
import { lightPieces, type PacketSource } from './light-stage.js'
import { stateName } from './run-folder.js'
import { PartError, partFolder, requireParts } from './run-part.js'
import type { Identity } from './state/identity.js'
import { openPiece, pieceFile } from './state/state-folder.js'

/** All parts of a run, found in the state of some run folders. */
export interface GatheredParts {
  of: number
  /** Folders of pieces, in the order of the parts. */
  folders: string[]
}

/** Finds the parts of a scene in run folders. Throws PartError that names what is missing, there twice or of another division. */
export function gatherParts(scene: Scene, runFolders: string[]): GatheredParts {
  const found = [...new Set(runFolders)].flatMap(partsIn)
  const where = runFolders.join(', ')
  if (found.length === 0) throw new PartError(`there are no parts in ${where}; make them with run --part`)
  const { of } = found[0]
  const other = found.find((part) => part.of !== of)
  if (other) throw new PartError(`parts of different divisions: ${found[0].path} and ${other.path}; join only one kind`)
  requireParts(scene, of)
  const folders = Array.from({ length: of }, (_, i) => {
    const [first, second] = found.filter(({ index }) => index === i + 1)
    if (second) throw new PartError(`part ${i + 1}/${of} is there twice: ${first.path} and ${second.path}; join only one of them`)
    return first?.path
  })
  const missing = folders.flatMap((path, i) => (path === undefined ? [`${i + 1}/${of}`] : []))
  if (missing.length > 0)
    throw new PartError(
      `${missing.length === 1 ? 'part' : 'parts'} ${missing.join(', ')} not found in ${where}; make ${missing.length === 1 ? 'it' : 'them'} with run --part`
    )
  const wavelengths = observedWavelengths(scene).length
  folders.forEach((path, i) => {
    const done = Array.from({ length: wavelengths }, (_, k) => existsSync(pieceFile(path!, lightPieces(k).done)))
    const count = done.filter(Boolean).length
    if (count < wavelengths)
      throw new PartError(
        `part ${i + 1}/${of} in ${path} is unfinished (${count} of ${wavelengths} wavelengths); go on with run --part ${i + 1}/${of} --resume`
      )
  })
  return { of, folders: folders as string[] }
}

function partsIn(runFolder: string): { index: number; of: number; path: string }[] {
  const state = join(runFolder, stateName)
  if (!existsSync(state)) return []
  return readdirSync(state).flatMap((name) => {
    const [, index, of] = /^part-(\d+)-of-(\d+)$/.exec(name)?.map(Number) ?? []
    return index >= 1 && index <= of && name === partFolder({ index, of }) ? [{ index, of, path: join(state, name) }] : []
  })
}

/** The packets of all parts as the source of a run. Throws StateError for pieces that are damaged or of another run. */
export function packetsOfParts({ folders }: GatheredParts, identity: Identity): PacketSource {
  return async ({ atMost, tallied }, index) => {
    const name = lightPieces(index).done
    const shares = folders.map((folder) => openPiece(pieceFile(folder, name), identity) as unknown as Share)
    const batches = divide(atMost, tallied)
    return { sums: joinShares(shares, batches), packets: batches.count * batches.packets, error: Number.NaN }
  }
}
