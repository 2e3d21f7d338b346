/** One value of a CSV file, quoted where it has to be (RFC 4180). */
export const csvCell = (text: string): string => (/[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)
