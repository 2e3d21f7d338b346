/** Trotter slices of a path-integral rehearsal: where none are asked for, and the most. */
export const PATH_DEFAULTS = { slices: 32, mostSlices: 256 } as const
