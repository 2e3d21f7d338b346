/** Requests a minute; null where none are counted. */
export interface RateSettings {
  /** Of a session or a token. */
  caller: number | null
  /** Of a network address, for requests that come with neither. */
  address: number | null
}

const CALLER = 1200
const ADDRESS = 300
const MOST = 1_000_000

function quota(name: string, text: string | undefined, preset: number): number | null {
  if (text === undefined || text === '') return preset
  const value = Number(text)
  if (!Number.isInteger(value) || value < 0 || value > MOST)
    throw new Error(
      `${name} is ${text}; it has to be a whole number of requests a minute up to ${MOST}, 0 for no limit.`,
    )
  return value === 0 ? null : value
}

/** Reads `RATE_LIMIT` and `RATE_LIMIT_ADDRESS`. @throws Error naming the variable that is wrong */
export const rateSettingsOf = (env: Record<string, string | undefined>): RateSettings => ({
  caller: quota('RATE_LIMIT', env.RATE_LIMIT, CALLER),
  address: quota('RATE_LIMIT_ADDRESS', env.RATE_LIMIT_ADDRESS, ADDRESS),
})
