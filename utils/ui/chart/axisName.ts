import type { ChartAxis } from './types'

/** Name of an axis with its unit: `logical energy, in units of the problem`. */
export const axisName = ({ label, unit }: ChartAxis): string => (unit ? `${label}, ${unit}` : label)
