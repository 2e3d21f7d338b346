import { BYTES } from './growth-bytes'

/** The part of the WebAssembly interface (W3C, WebAssembly JavaScript Interface 1.0) that is used here. */
interface Memory {
  readonly buffer: ArrayBuffer
  grow(pages: number): number
}
interface WebAssemblyInterface {
  readonly Module: new (bytes: Uint8Array) => object
  readonly Instance: new (module: object) => { readonly exports: object }
}
interface GrowthExports {
  readonly memory: Memory
  bind(table: number): void
  grow(variable: number, start: number, placed: number, ceiling: number, touchNow: number): number
}

/** `assembly` where the platform has WebAssembly, else the plain code; both give the same trees. */
export type KernelChoice = 'assembly' | 'plain'

const PAGE = 65536

let compiled: object | null = null

/** Compiled once a thread; a few hundred microseconds. */
function compile({ Module }: WebAssemblyInterface): object {
  compiled ??= new Module(Uint8Array.from(BYTES.match(/../g) ?? [], (pair) => parseInt(pair, 16)))
  return compiled
}

/** Arrays by name, in one linear memory when a kernel works on them. */
export interface Arrays<I extends string, F extends string> {
  readonly ints: Readonly<Record<I, Int32Array>>
  readonly floats: Readonly<Record<F, Float64Array>>
  readonly kernel: GrowthExports | null
}

function instantiate(choice: KernelChoice, bytes: number): GrowthExports | null {
  const { WebAssembly: platform } = globalThis as { WebAssembly?: WebAssemblyInterface }
  if (choice === 'plain' || !platform) return null
  const { exports } = new platform.Instance(compile(platform)) as { exports: GrowthExports }
  exports.memory.grow(Math.ceil(bytes / PAGE))
  return exports
}

/**
 * Allocates named arrays of the given lengths, zeroed: in the memory of a fresh kernel, or each by itself for the plain
 * code.
 */
export function allocate<I extends string, F extends string>(
  choice: KernelChoice,
  intLengths: Readonly<Record<I, number>>,
  floatLengths: Readonly<Record<F, number>>,
): Arrays<I, F> {
  const sum = (lengths: Readonly<Record<string, number>>): number =>
    Object.values(lengths).reduce((total, length) => total + length, 0)
  const kernel = instantiate(choice, 4 * sum(intLengths) + 8 * sum(floatLengths))
  // The first page belongs to the kernel's own data.
  let at = PAGE
  const place = (bytes: number): number => (at += bytes) - bytes
  const floats = {} as Record<F, Float64Array>
  const ints = {} as Record<I, Int32Array>
  for (const name in floatLengths) {
    const length = floatLengths[name]
    floats[name] = kernel ? new Float64Array(kernel.memory.buffer, place(8 * length), length) : new Float64Array(length)
  }
  for (const name in intLengths) {
    const length = intLengths[name]
    ints[name] = kernel ? new Int32Array(kernel.memory.buffer, place(4 * length), length) : new Int32Array(length)
  }
  return { ints, floats, kernel }
}
