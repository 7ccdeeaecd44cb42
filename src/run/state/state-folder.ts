import { existsSync } from 'node:fs'
import { mkdir, rm } from 'node:fs/promises'
import { join } from 'node:path'
import { writeFileAtomic } from '../../output/atomic.js'
import type { Ledger, Piece } from '../../workers/ledger.js'
import { asOutputError } from '../output-error.js'
import { difference, type Identity } from './identity.js'
import { BrokenPiece, readPiece, writePiece } from './piece-file.js'

/** What was kept cannot be used for the run at hand; the message says why and what to do. Exit code 2. */
export class StateError extends Error {
  override name = 'StateError'
}

/** Seconds between states; with the time of writing one still below thirty. */
const INTERVAL = 15
/** A state is never written sooner than this many times what the last one took. */
const PATIENCE = 50

/** A folder of pieces, one file each. Pieces are written in the background, in the order in which they were kept. */
export class StateFolder implements Ledger {
  private readonly waiting = new Map<string, Piece | undefined>()
  private writer: Promise<void> | undefined
  private failure: unknown
  private last = { end: performance.now(), seconds: 0 }

  /** Every piece is signed with the identity; those of the dust without the estimator. */
  constructor(
    readonly path: string,
    private readonly identity: Identity,
    /** Folder of pieces that other processes made and this one only reads, if any. */
    private readonly shared?: string
  ) {}

  /** Throws StateError when the piece is damaged or belongs to another run. */
  take(name: string): Piece | undefined {
    const path = [this.path, ...(this.shared ? [this.shared] : [])].map((folder) => pieceFile(folder, name)).find(existsSync)
    return path ? openPiece(path, this.identityFor(name)) : undefined
  }

  keep(name: string, piece: Piece): void {
    this.post(name, piece)
  }

  offer(name: string, make: () => Piece, milestone = false): void {
    if (this.failure) throw this.failure
    const since = (performance.now() - this.last.end) / 1000
    if (!this.writer && since >= Math.max(milestone ? 0 : INTERVAL, PATIENCE * this.last.seconds)) this.keep(name, make())
  }

  forget(name: string): void {
    this.post(name, undefined)
  }

  async settle(): Promise<void> {
    while (this.writer) await this.writer
    if (this.failure) throw this.failure
  }

  private post(name: string, piece: Piece | undefined): void {
    if (this.failure) throw this.failure
    // What was kept last has to be written last, lest a piece be gone before the one that follows from it is there.
    this.waiting.delete(name)
    this.waiting.set(name, piece)
    this.writer ??= this.write()
  }

  private async write(): Promise<void> {
    try {
      for (const [name, piece] of this.waiting) {
        this.waiting.delete(name)
        const start = performance.now()
        await this.put(name, piece)
        const end = performance.now()
        this.last = { end, seconds: (end - start) / 1000 }
      }
    } catch (error) {
      this.failure = asOutputError(this.path, error)
    }
    this.writer = undefined
  }

  private async put(name: string, piece: Piece | undefined): Promise<void> {
    const path = pieceFile(this.path, name)
    if (piece === undefined) return rm(path, { force: true })
    await mkdir(this.path, { recursive: true })
    const signed = { identity: this.identityFor(name), ...piece }
    await writeFileAtomic(path, (file) => writePiece(file, signed))
  }

  private identityFor(name: string): Identity {
    const { estimator, ...rest } = this.identity
    return name.startsWith('dust') ? rest : this.identity
  }
}

/** Where a folder keeps the piece of that name. */
export function pieceFile(folder: string, name: string): string {
  return join(folder, `${name}.bin`)
}

/** Reads a piece from its file. Throws StateError when it is damaged or belongs to another run. */
export function openPiece(path: string, identity: Identity): Piece {
  try {
    const { identity: kept, ...piece } = readPiece(path)
    const why = difference(kept as Identity, identity)
    if (why) throw new StateError(`${path} belongs to another run: ${why}`)
    return piece
  } catch (error) {
    if (error instanceof BrokenPiece)
      throw new StateError(`${path} cannot be used: ${error.message}; remove it to lose only what it held`)
    throw asOutputError(path, error)
  }
}
