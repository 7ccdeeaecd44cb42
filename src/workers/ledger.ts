/** Work half done or done: JSON values (NaN and infinities too) and typed arrays, nested as one likes. */
export type Piece = Record<string, unknown>

/** Where a run keeps its pieces, so that another process can go on from there. */
export interface Ledger {
  /** The piece last kept under a name. */
  take(name: string): Piece | undefined
  /** Keeps a piece instead of the one before. Its arrays must not change any more. */
  keep(name: string, piece: Piece): void
  /** Keeps what `make` gives when a state is due; at a `milestone` it nearly always is. */
  offer(name: string, make: () => Piece, milestone?: boolean): void
  forget(name: string): void
  /** Resolves when everything kept is where it should be. */
  settle(): Promise<void>
}

/** For runs that need not be continued. */
export const noLedger: Ledger = {
  take: () => undefined,
  keep: () => {},
  offer: () => {},
  forget: () => {},
  settle: async () => {}
}

/** A part of a ledger for itself: its pieces have names of their own. */
export function sectionOf(ledger: Ledger, section: string): Ledger {
  const named = (name: string) => `${name}-${section}`
  return {
    take: (name) => ledger.take(named(name)),
    keep: (name, piece) => ledger.keep(named(name), piece),
    offer: (name, make, milestone) => ledger.offer(named(name), make, milestone),
    forget: (name) => ledger.forget(named(name)),
    settle: () => ledger.settle()
  }
}
