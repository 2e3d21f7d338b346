/**
 * Units in which tables of A(s) and B(s) are given, and what one of each is in GHz (E/h). From the exact constants of the
 * SI (CODATA 2018): h = 6.62607015·10⁻³⁴ J s, k_B = 1.380649·10⁻²³ J/K, e = 1.602176634·10⁻¹⁹ C. An angular frequency ω
 * stands for the energy ħω, so it is divided by 2π.
 */
const PLANCK = 6.62607015e-34
const BOLTZMANN = 1.380649e-23
const ELECTRONVOLT = 1.602176634e-19

/** k_B/h in GHz for each kelvin: 20.8366. */
export const GIGAHERTZ_PER_KELVIN = BOLTZMANN / PLANCK / 1e9

const perSecond = 1 / (2 * Math.PI * 1e9)
const joule = 1 / PLANCK / 1e9

const UNITS: ReadonlyMap<string, { readonly gigahertz: number; readonly by: string }> = new Map([
  ['GHz', { gigahertz: 1, by: '' }],
  ['THz', { gigahertz: 1000, by: '1 THz = 1000 GHz' }],
  ['MHz', { gigahertz: 1e-3, by: '1 MHz = 0.001 GHz' }],
  ['kHz', { gigahertz: 1e-6, by: '1 kHz = 10⁻⁶ GHz' }],
  ['Hz', { gigahertz: 1e-9, by: '1 Hz = 10⁻⁹ GHz' }],
  ['rad/s', { gigahertz: perSecond, by: 'E = ħω, so f = ω/2π' }],
  ['rad/ns', { gigahertz: perSecond * 1e9, by: 'E = ħω, so f = ω/2π' }],
  ['J', { gigahertz: joule, by: 'f = E/h' }],
  ['eV', { gigahertz: joule * ELECTRONVOLT, by: '1 eV = 241 799 GHz' }],
  ['meV', { gigahertz: joule * ELECTRONVOLT * 1e-3, by: '1 meV = 241.799 GHz' }],
  ['µeV', { gigahertz: joule * ELECTRONVOLT * 1e-6, by: '1 µeV = 0.241799 GHz' }],
  ['K', { gigahertz: GIGAHERTZ_PER_KELVIN, by: '1 K = 20.8366 GHz' }],
  ['mK', { gigahertz: GIGAHERTZ_PER_KELVIN * 1e-3, by: '1 mK = 0.0208366 GHz' }],
])

export const ENERGY_UNIT_NAMES = [...UNITS.keys()].join(', ')

/** Prefixes differ by their case alone (meV, MeV), so that only hertz may be written in one case throughout. */
function unitNamed(name: string): string {
  const isOneCase = name === name.toLowerCase() || name === name.toUpperCase()
  if (isOneCase && /hz$/i.test(name))
    return [...UNITS.keys()].find((unit) => unit.toLowerCase() === name.toLowerCase()) ?? name
  return name.replace(/^[\u03bcu](?=eV$)/, 'µ')
}

/** @returns what one of the unit is in GHz and how that is reckoned; undefined for a unit that is not known */
export const energyUnit = (name: string): { readonly gigahertz: number; readonly by: string } | undefined =>
  UNITS.get(unitNamed(name))

/** The thermal energy k_B T as a frequency in GHz, of a temperature in mK. */
export const thermalGigahertz = (millikelvin: number): number => (millikelvin / 1000) * GIGAHERTZ_PER_KELVIN
