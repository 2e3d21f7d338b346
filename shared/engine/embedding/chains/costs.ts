/** Distance of a qubit without a label, and cost of one that is out of reach; two of them fit a signed integer. */
export const FAR = 2 ** 30 - 1
/** Fixed-point unit of a qubit's cost: small enough a grain for tie-breaks, large enough for exact sums in a double. */
export const COST_UNIT = 64
