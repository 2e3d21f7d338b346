/** What a problem document says it is. */
export const JSON_KIND = 'espalier.problem'
export const JSON_VERSION = 1
