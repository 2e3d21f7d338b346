import { entry } from './entry'
import { over, plus } from './formula'
import { CUTHILL_MCKEE, DEFINITION, GOGATE_DECHTER, KING_MCGEOCH, OWN } from './sources'
import { formatNumber, formatPercent } from '../format'

/** How the slower figures of a problem's structure, and those of its constraint groups, are computed. */

interface Needed {
  weight: number
  needed: number
  overlaps: number
}

export const structureHelp = {
  treewidthBelow: entry<{ variables: number; interactions: number; bound: number }>({
    inputs: ({ variables, interactions }) => [
      { symbol: 'n', name: 'variables', value: variables },
      { symbol: 'm', name: 'interactions', value: interactions },
    ],
    method: () =>
      'Again and again a variable of least degree is merged into the neighbour with which it shares fewest neighbours; the second smallest degree met on the way is a bound, since treewidth never grows by merging. Deleting in place of merging, and a bound from routing, are tried too; the best counts. The upper end comes from elimination by least fill.',
    result: ({ bound }) => `≥ ${formatNumber(bound)}`,
    sources: () => [GOGATE_DECHTER],
    caution: () =>
      'A proved lower bound: the treewidth itself may be larger. Of large problems only part of this is tried.',
  }),
  bandwidth: entry<{ bandwidth: number; order: 'given' | 'banded'; interactions: number }>({
    inputs: ({ interactions }) => [{ symbol: 'm', name: 'interactions', value: interactions }],
    method: ({ order }) =>
      order === 'given'
        ? 'The greatest distance between the places of two variables that interact, in the order given.'
        : 'The greatest distance between the places of two variables that interact. The order is that of reverse Cuthill–McKee: breadth first from a variable far out, neighbours by ascending degree, and all of it backwards.',
    result: ({ bandwidth }) => formatNumber(bandwidth),
    sources: ({ order }) => [order === 'given' ? DEFINITION : CUTHILL_MCKEE],
    caution: ({ order }) => (order === 'banded' ? 'A narrow band, but not always the narrowest.' : undefined),
  }),
  underNoise: entry<{
    name: string
    fieldsUnder: number
    interactionsUnder: number
    coefficients: number
    sigmaH: number
    sigmaJ: number
    scale: number
  }>({
    inputs: ({ name, fieldsUnder, interactionsUnder, coefficients, sigmaH, sigmaJ, scale }) => [
      { symbol: 'σ_h', name: 'control error of h', value: sigmaH, from: `sheet of ${name}` },
      { symbol: 'σ_J', name: 'control error of J', value: sigmaJ, from: `sheet of ${name}` },
      { symbol: 'α', name: 'scale that fits the largest into its range, at most 1', value: scale },
      { symbol: 'F', name: 'fields scaled below twice the σ of h', value: fieldsUnder },
      { symbol: 'C', name: 'interactions scaled below twice the σ of J', value: interactionsUnder },
      { symbol: 'N', name: 'fields and interactions that are not zero', value: coefficients },
    ],
    steps: ({ coefficients }) => [
      { symbol: 'U', name: 'coefficients under 2σ', isAsked: true, expr: plus('F', 'C') },
      ...(coefficients > 0
        ? [
            {
              symbol: 'S',
              name: 'share of them',
              expr: over('U', 'N'),
              show: (value: number) => formatPercent(value),
            },
          ]
        : []),
    ],
    method: () => 'Of the Ising form, before embedding: one qubit a variable, one coupler an interaction.',
    sources: () => [KING_MCGEOCH],
    caution: () => 'Optimistic: chains share fields out and need range of their own.',
  }),
  penaltyWeight: entry<{ coupling: number; deviating: number; pairs: number; greatest: number }>({
    inputs: ({ coupling, deviating, pairs, greatest }) => [
      { symbol: 'b', name: 'coupling that most pairs of the group share, as a QUBO', value: coupling },
      { symbol: 'd', name: `pairs of ${formatNumber(pairs)} that differ from it`, value: deviating },
      { symbol: 'e', name: 'by at most', value: greatest },
    ],
    steps: () => [{ symbol: 'P', name: 'penalty weight', expr: over('b', 2) }],
    method: () => 'P (Σ x − k)² and, for at most one, 2P Σ x x couple every pair of the group by 2P.',
    sources: () => [DEFINITION],
  }),
  penaltyEnough: entry<Needed>({
    inputs: ({ weight }) => [{ symbol: 'P', name: 'penalty weight', value: weight }],
    method: ({ overlaps }) =>
      overlaps > 0
        ? 'The group shares variables with others. Setting the variables of all groups that hang together anew changes the rest of the objective by at most the sum of the sizes of its coefficients there, so a P above that is enough as long as some state keeps all these groups.'
        : 'With r the coefficients of the rest of the objective, switching member i off gains at most −r_i + Σ max(0, −r_ij), switching it on costs at most r_i + Σ max(0, r_ij). A P above the (k + 1)-th largest of the first and the (s − k + 1)-th largest of the second, s being the size of the group, makes every change towards the group pay; of at most one, half of the second largest of the first.',
    result: ({ needed }) => formatNumber(needed, { significant: 4 }),
    sources: () => [OWN],
    caution: () => 'Sufficient, not necessary: smaller weights may do. Without a P above it nothing is proved.',
  }),
  penaltySingle: entry<Needed>({
    inputs: ({ weight }) => [{ symbol: 'P', name: 'penalty weight', value: weight }],
    method: () =>
      'The P that outweighs what the rest of the objective gains by one member switched on or off while all other groups hold: of the partners in one such group at most k are taken to be 1.',
    result: ({ needed }) => formatNumber(needed, { significant: 4 }),
    sources: () => [OWN],
    caution: () => 'It rules out single changes only; several at once may still pay.',
  }),
}
