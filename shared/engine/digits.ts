/** Narrow no-break space: between groups of digits, and between a number and its unit. */
export const THIN_SPACE = '\u202f'

/** A count, or its digits, with thin spaces between groups of three: 1279 becomes `1 279`. */
export const groupDigits = (digits: number | string): string => String(digits).replace(/\B(?=(\d{3})+$)/g, THIN_SPACE)
