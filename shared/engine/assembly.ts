/** The part of the WebAssembly interface (W3C, WebAssembly JavaScript Interface 1.0) that the engine uses. */
interface Memory {
  readonly buffer: ArrayBuffer
  grow(pages: number): number
}
interface WebAssemblyInterface {
  readonly Module: new (bytes: Uint8Array) => object
  readonly Instance: new (module: object) => { readonly exports: object }
}

/** What every kernel exports. */
export interface KernelExports {
  readonly memory: Memory
  bind(table: number): void
}

/** `assembly` where the platform has what the kernel needs, else the plain code; both give the same results. */
export type KernelChoice = 'assembly' | 'plain'

/** Bytes of a page of linear memory. The first one belongs to the kernel's own data. */
export const PAGE = 65536

/** Modules by their bytes, compiled once a thread; null where the platform refuses them. */
const compiled = new Map<string, object | null>()

function moduleOf({ Module }: WebAssemblyInterface, bytes: string): object | null {
  let module = compiled.get(bytes)
  if (module === undefined) {
    try {
      module = new Module(Uint8Array.from(bytes.match(/../g) ?? [], (pair) => parseInt(pair, 16)))
    } catch {
      module = null
    }
    compiled.set(bytes, module)
  }
  return module
}

/**
 * A fresh instance of a kernel, given as hexadecimal text, with room for so many bytes beyond the first page; null where
 * the platform has no WebAssembly, or not the instructions that the kernel is made of.
 */
export function instantiate<Exports extends KernelExports>(bytes: string, room: number): Exports | null {
  const { WebAssembly: platform } = globalThis as { WebAssembly?: WebAssemblyInterface }
  const module = platform ? moduleOf(platform, bytes) : null
  if (!platform || !module) return null
  const { exports } = new platform.Instance(module) as { exports: Exports }
  exports.memory.grow(Math.ceil(room / PAGE))
  return exports
}
