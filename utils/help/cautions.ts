/** The cautions that the product states, where a number asks for one. */
export const CAUTIONS = {
  samples: 'Samples are not proofs of optimality: a better assignment may exist.',
  rehearsal: 'From a rehearsal: a classical stand-in for checking settings, not a forecast of the machine.',
  sheet: 'Machine figures are what the steward entered; nothing is asked of the machine.',
  estimate: 'An estimate from the machine sheet’s own figures: the machine may take more or less.',
  bestFound: 'Best found is not a proof of optimality: a better state may exist.',
  provedAsGiven:
    'Proved for the coefficients as given. Whether the problem says what was meant needs a check of its own.',
  noneFound: 'None found proves nothing: a larger one may be found another way.',
  sufficient: 'Sufficient, not necessary: chains below it may still hold. Rehearse before you settle it.',
} as const
