/**
 * Where the usable qubits lie, in a grid of square cells, to find free ones near a point.
 */
export class Ground {
  private readonly left: number
  private readonly top: number
  private readonly width: number
  private readonly height: number
  private readonly columns: number
  private readonly rows: number
  private readonly cell: number
  /** Qubits of cell c: qubits[offsets[c] … offsets[c + 1] − 1]. */
  private readonly offsets: Int32Array
  private readonly qubits: Int32Array
  readonly usable: number

  /** @param segments four numbers a qubit; its middle is where it counts as lying */
  constructor(
    private readonly segments: Float32Array,
    usable: Uint8Array,
  ) {
    let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity]
    let count = 0
    for (let q = 0; q < usable.length; q++) {
      if (!usable[q]) continue
      count++
      left = Math.min(left, this.x(q))
      right = Math.max(right, this.x(q))
      top = Math.min(top, this.y(q))
      bottom = Math.max(bottom, this.y(q))
    }
    this.usable = count
    this.left = count ? left : 0
    this.top = count ? top : 0
    this.width = count ? right - left : 0
    this.height = count ? bottom - top : 0
    this.cell = Math.sqrt(((this.width + 1) * (this.height + 1) * QUBITS_PER_CELL) / Math.max(1, count))
    this.columns = Math.floor(this.width / this.cell) + 1
    this.rows = Math.floor(this.height / this.cell) + 1
    this.offsets = new Int32Array(this.columns * this.rows + 1)
    this.qubits = new Int32Array(count)
    this.fill(usable)
  }

  private fill(usable: Uint8Array): void {
    const { offsets, qubits } = this
    for (let q = 0; q < usable.length; q++) if (usable[q]) offsets[this.cellOf(q) + 1]!++
    for (let c = 0; c + 1 < offsets.length; c++) offsets[c + 1]! += offsets[c]!
    const next = offsets.slice(0, -1)
    for (let q = 0; q < usable.length; q++) if (usable[q]) qubits[next[this.cellOf(q)]!++] = q
  }

  private x(q: number): number {
    return (this.segments[4 * q]! + this.segments[4 * q + 2]!) / 2
  }

  private y(q: number): number {
    return (this.segments[4 * q + 1]! + this.segments[4 * q + 3]!) / 2
  }

  private cellOf(q: number): number {
    const column = Math.floor((this.x(q) - this.left) / this.cell)
    const row = Math.floor((this.y(q) - this.top) / this.cell)
    return row * this.columns + column
  }

  /** Width by height, kept from being extreme for machines of a single row. */
  get aspect(): number {
    return Math.min(64, Math.max(1 / 64, (this.width + 1) / (this.height + 1)))
  }

  /**
   * The nearest qubit to the point (x, y) of the unit square, spread over the middle `share` of the machine's width and
   * height: one without a chain while there is one. There must be a usable qubit.
   */
  nearest(x: number, y: number, share: number, use: Int32Array): number {
    const px = this.left + this.width * (0.5 + (x - 0.5) * share)
    const py = this.top + this.height * (0.5 + (y - 0.5) * share)
    const free = this.scan(px, py, use)
    return free >= 0 ? free : this.scan(px, py, null)
  }

  private scan(px: number, py: number, use: Int32Array | null): number {
    const { columns, rows, cell, offsets, qubits } = this
    const column = Math.min(columns - 1, Math.floor((px - this.left) / cell))
    const row = Math.min(rows - 1, Math.floor((py - this.top) / cell))
    let best = -1
    let bestDistance = Infinity
    const most = Math.max(columns, rows)
    for (let ring = 0; ring < most && bestDistance > (ring - 1) ** 2 * cell * cell; ring++) {
      for (let r = Math.max(0, row - ring); r <= Math.min(rows - 1, row + ring); r++) {
        const step = Math.abs(r - row) === ring ? 1 : Math.max(1, 2 * ring)
        for (let c = column - ring; c <= column + ring; c += step) {
          if (c < 0 || c >= columns) continue
          for (let i = offsets[r * columns + c]!; i < offsets[r * columns + c + 1]!; i++) {
            const q = qubits[i]!
            if (use && use[q]! > 0) continue
            const distance = (this.x(q) - px) ** 2 + (this.y(q) - py) ** 2
            if (distance >= bestDistance) continue
            best = q
            bestDistance = distance
          }
        }
      }
    }
    return best
  }
}

/** Mean number of qubits in a cell. */
const QUBITS_PER_CELL = 4
