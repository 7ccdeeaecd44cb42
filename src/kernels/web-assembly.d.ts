/** What kernels need of the WebAssembly JavaScript interface (a W3C recommendation); TypeScript has it for browsers only. */
declare namespace WebAssembly {
  class Module {
    constructor(bytes: Uint8Array)
  }
  class Instance {
    constructor(module: Module)
    readonly exports: unknown
  }
  interface Memory {
    readonly buffer: ArrayBuffer
    grow(pages: number): number
  }
  interface Global {
    readonly value: number
  }
}
