/** One value of a CSV file, quoted where it has to be (RFC 4180). */
export const csvCell = (text: string): string => (/[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)

/**
 * Words that somebody wrote, in a file that is read in a spreadsheet: an apostrophe keeps them from being taken for a
 * formula. For labels of variables and other data that is read back, `csvCell` keeps every character.
 */
export const csvWords = (text: string): string => csvCell(/^[=+\-@\t\r]/.test(text) ? `'${text}` : text)
