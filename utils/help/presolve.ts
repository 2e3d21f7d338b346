import { entry } from './entry'
import { BOROS_HAMMER, HAMMER_HANSEN_SIMEONE } from './sources'
import { formatNumber } from '../format'

/** How the figures of a pre-solve are computed. */
export const presolveHelp = {
  presolveBound: entry<{ bound: number; rounds: number; sense: 'min' | 'max'; isSolved: boolean }>({
    inputs: ({ rounds }) => [{ symbol: 'r', name: 'rounds of roof duality', value: rounds }],
    method: ({ sense, isSolved }) =>
      isSolved
        ? 'Every variable was settled by a rule that keeps an optimum, so what is left is a constant: the optimum.'
        : `The roof dual of what is left: its constant after a maximum flow on the network of implications between literals${sense === 'max' ? ', with the sign of the problem’s own sense' : ''}. No state is better. By exact arithmetic, rounded to the safe side.`,
    result: ({ bound }) => formatNumber(bound),
    sources: () => [HAMMER_HANSEN_SIMEONE, BOROS_HAMMER],
    caution: ({ isSolved }) => (isSolved ? undefined : 'The optimum may be worse than this bound.'),
  }),
}
