import { version } from '../package.json'

/** The product's version; every result carries it. */
export const VERSION: string = version
