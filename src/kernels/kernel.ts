import { readFileSync } from 'node:fs'

/** What every kernel exports: its memory, and where the first place behind its own is. */
interface Memory {
  memory: WebAssembly.Memory
  firstFree: () => number
}

/** A hot loop in WebAssembly with its memory; AssemblyScript compiles it from the folder of its name. Places in memory are in bytes. */
export class Kernel<Exports> {
  readonly exports: Exports & Memory
  private free: number

  constructor(name: string) {
    const module = new WebAssembly.Module(readFileSync(new URL(`./${name}.wasm`, import.meta.url)))
    this.exports = new WebAssembly.Instance(module).exports as Exports & Memory
    this.free = this.exports.firstFree()
  }

  /** Forgets what was laid. */
  clear(): void {
    this.free = this.exports.firstFree()
  }

  /** Copies an array behind those laid before; returns its place. */
  lay(array: ArrayLike<number>, kind: Float64ArrayConstructor | Int32ArrayConstructor = Float64Array): number {
    const place = this.free
    this.free += Math.ceil((array.length * kind.BYTES_PER_ELEMENT) / 64) * 64
    const { memory } = this.exports
    const missing = this.free - memory.buffer.byteLength
    if (missing > 0) memory.grow(Math.ceil(missing / PAGE))
    new kind(memory.buffer, place, array.length).set(array)
    return place
  }

  /** The numbers at a place, until memory grows. */
  doubles(place: number, length: number): Float64Array {
    return new Float64Array(this.exports.memory.buffer, place, length)
  }
}

const PAGE = 65536
