import { addBands, addDiscs, addHeldChains, addTubes } from './scene-chains'
import { addBreaks, addGlyphs, addJoints, addRings } from './scene-couplers'
import { addHeat } from './scene-heat'
import type { Draft, Scene, SceneInput } from './scene-types'
import { tiersOf } from './tiers'
import type { LatticeData } from './types'

/** Whether the machine is a lattice of points: its qubits have no length, and chains run along couplers. */
export const isOfPoints = ({ segments }: Pick<LatticeData, 'segments'>): boolean =>
  segments[0] === segments[2] && segments[1] === segments[3]

/** All that is drawn of the chains for one lens, one focus and one selection. */
export function buildScene(input: SceneInput): Scene {
  const { lens, load, read, hiddenKinds } = input
  const tiers = tiersOf(input)
  const points = isOfPoints(input.data)
  const draft: Draft = { edges: [], nodes: [], breaks: [] }
  if (points) addDiscs(input, tiers, draft)
  else if (lens === 'load' && load) addTubes(input, load, tiers, draft)
  else if (lens === 'breaks') addHeldChains(input, tiers, draft)
  else addBands(input, tiers, draft)
  addJoints(input, tiers, draft)
  if (input.heat && input.part !== 'focus') addHeat(input, input.heat, points, draft)
  if (lens === 'breaks') {
    if (read) addGlyphs(input, read, tiers, draft)
    if (!hiddenKinds?.has('breaks')) addBreaks(input, points, draft)
  } else if (!hiddenKinds?.has('couplers') && input.part !== 'rest') addRings(input, draft)
  return draft
}
