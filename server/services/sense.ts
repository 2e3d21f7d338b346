/** The sign that turns a stored (minimised) value into the problem's own sense. */
export const signOf = (sense: 'min' | 'max'): 1 | -1 => (sense === 'max' ? -1 : 1)

/** Multiplies by ±1 without ever showing −0. */
export const signed = (sign: 1 | -1, value: number): number => (value === 0 ? 0 : sign * value)
