type Arrays = Uint8Array | Uint32Array | Int32Array | Float32Array | Float64Array
type ArrayKind = new (buffer: SharedArrayBuffer) => Arrays

/** A copy of a value of plain objects and arrays whose typed arrays lie in memory that all threads see. */
export function shareArrays<T>(value: T): T {
  if (ArrayBuffer.isView(value)) {
    const array = value as unknown as Arrays
    const shared = new (array.constructor as ArrayKind)(new SharedArrayBuffer(array.byteLength))
    shared.set(array)
    return shared as T
  }
  if (Array.isArray(value)) return value.map(shareArrays) as T
  if (value && typeof value === 'object')
    return Object.fromEntries(Object.entries(value).map(([key, part]) => [key, shareArrays(part)])) as T
  return value
}
