import type { SearchState } from './state'

/** What `soleContact` answers besides a variable. */
export const NO_CONTACT = -1
export const SEVERAL_CONTACTS = -2

/** Adds `sign` to the contact counts of the variable under inspection for every coupler that leaves the qubit. */
export function countCouplers(state: SearchState, qubit: number, sign: 1 | -1): void {
  const { machine, chains, contacts, isNeighbour, neighbourNow } = state
  for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
    for (let record = chains.ownerHead[machine.targets[p]!]!; record >= 0; record = chains.ownerNext[record]!) {
      const u = chains.variable[record]!
      if (isNeighbour[u] === neighbourNow) contacts[u]! += sign
    }
  }
}

/** Puts a variable under inspection: counts the couplers between its chain and those of its interaction partners. */
export function inspectContacts(state: SearchState, variable: number): void {
  const { problem, chains, contacts, isNeighbour } = state
  const now = ++state.neighbourNow
  for (let p = problem.offsets[variable]!; p < problem.offsets[variable + 1]!; p++) {
    const u = problem.targets[p]!
    isNeighbour[u] = now
    contacts[u] = 0
  }
  for (let record = chains.chainHead[variable]!; record >= 0; record = chains.chainNext[record]!)
    countCouplers(state, chains.qubit[record]!, 1)
}

/**
 * The one partner that the chain under inspection touches only through this qubit, or `NO_CONTACT`, or
 * `SEVERAL_CONTACTS` when there is more than one such partner.
 */
export function soleContact(state: SearchState, qubit: number): number {
  const { machine, chains, contacts, tally, tallied, isNeighbour, neighbourNow } = state
  let distinct = 0
  for (let p = machine.offsets[qubit]!; p < machine.offsets[qubit + 1]!; p++) {
    for (let record = chains.ownerHead[machine.targets[p]!]!; record >= 0; record = chains.ownerNext[record]!) {
      const u = chains.variable[record]!
      if (isNeighbour[u] !== neighbourNow) continue
      if (tally[u]!++ === 0) tallied[distinct++] = u
    }
  }
  let sole = NO_CONTACT
  for (let i = 0; i < distinct; i++) {
    const u = tallied[i]!
    if (tally[u] === contacts[u]) sole = sole === NO_CONTACT ? u : SEVERAL_CONTACTS
    tally[u] = 0
  }
  return sole
}

/** Interactions without a coupler between the two chains, as edge numbers of the problem graph, ascending. */
export function unmetEdges(state: SearchState): number[] {
  const { problem, contacts } = state
  const unmet: number[] = []
  for (let v = 0; v < problem.order; v++) {
    inspectContacts(state, v)
    for (let p = problem.offsets[v]!; p < problem.offsets[v + 1]!; p++) {
      const u = problem.targets[p]!
      if (u > v && contacts[u] === 0) unmet.push(problem.edgeIds[p]!)
    }
  }
  return unmet
}
