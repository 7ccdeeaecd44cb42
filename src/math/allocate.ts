/** Gives the memory behind a typed array, so that a caller can ask for memory shared between threads. */
export type Allocate = (byteLength: number) => ArrayBufferLike

export const allocatePrivate: Allocate = (byteLength) => new ArrayBuffer(byteLength)

export const allocateShared: Allocate = (byteLength) => new SharedArrayBuffer(byteLength)
