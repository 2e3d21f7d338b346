import type { PublishedFamily } from '../../machine/fabric'
import { familyProblems, qubitCount } from '../../machine/family'
import { familyTreewidth } from '../bounds/family-treewidth'

/** A larger machine of the same family that may do. All figures but the family are estimates. */
export interface LargerMachine {
  readonly family: PublishedFamily
  /** Working qubits, if as large a share works as on the present machine. */
  readonly qubits: number
  /** Share of them that the closest state would take up. */
  readonly share: number
  /** Why no smaller size was named. */
  readonly limitedBy: 'room' | 'treewidth'
}

const DEFAULTS = {
  /**
   * Share of the working qubits that the closest state may ask for. Measured with this engine's searches on random
   * regular graphs and square grids on Chimera and Pegasus: what asked for less was found, with 65 to 85 % in use.
   */
  fill: 0.8,
}

/** The family one size up; both sides of rectangles grow. */
function nextSize(family: PublishedFamily): PublishedFamily {
  switch (family.kind) {
    case 'chimera':
      return { ...family, m: family.m + 1, n: family.n + 1 }
    case 'pegasus':
    case 'zephyr':
      return { ...family, m: family.m + 1 }
    case 'king':
    case 'square':
      return { ...family, width: family.width + 1, height: family.height + 1 }
    case 'cubic':
      return { ...family, width: family.width + 1, height: family.height + 1, depth: family.depth + 1 }
    case 'heavy-hex':
      return { ...family, rows: family.rows + 1, columns: family.columns + 1 }
  }
}

/**
 * The next size of the family that may hold the problem, by the room that the closest state asks for and by treewidth;
 * null when none up to the largest possible does.
 * @param needed qubits that the closest state asks for, chains on shared qubits counted each
 * @param usable working qubits of the present machine
 * @param treewidth a proved lower bound of the problem's
 */
export function largerMachine(
  family: PublishedFamily,
  needed: number,
  usable: number,
  treewidth: number,
): LargerMachine | null {
  const working = usable / qubitCount(family)
  let limitedBy: LargerMachine['limitedBy'] = 'room'
  for (let next = nextSize(family); familyProblems(next).length === 0; next = nextSize(next)) {
    const qubits = Math.floor(working * qubitCount(next))
    const share = needed / qubits
    const roomy = share <= DEFAULTS.fill
    const wide = familyTreewidth(next) >= treewidth
    if (roomy && wide) return { family: next, qubits, share, limitedBy }
    if (!wide) limitedBy = 'treewidth'
    else if (!roomy) limitedBy = 'room'
  }
  return null
}
