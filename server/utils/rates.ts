import { RateLimiter } from '../rate-limit/limiter'
import { rateSettingsOf } from '../rate-limit/settings'

let limiter: RateLimiter | undefined

/** The one that counts in this process; what is wrong with its settings has ended the start. */
export const useRateLimiter = (): RateLimiter => (limiter ??= new RateLimiter(rateSettingsOf(process.env)))
