/** Names as they stand in what a browser says it is, the more special before those that it also claims to be. */
const BROWSERS: [RegExp, string][] = [
  [/\bEdg(?:e|A|iOS)?\//, 'Edge'],
  [/\b(?:OPR|Opera)\//, 'Opera'],
  [/\b(?:Firefox|FxiOS)\//, 'Firefox'],
  [/\b(?:Chrome|CriOS|Chromium|HeadlessChrome)\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
]
const SYSTEMS: [RegExp, string][] = [
  [/\biPhone\b/, 'iPhone'],
  [/\biPad\b/, 'iPad'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b|\bMacintosh\b/, 'macOS'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
]

const firstOf = (names: [RegExp, string][], userAgent: string) =>
  names.find(([pattern]) => pattern.test(userAgent))?.[1]

/** “Firefox on Linux”, as far as a browser says what it is; a program that says something else, as it says it. */
export function deviceName(userAgent: string): string {
  const browser = firstOf(BROWSERS, userAgent)
  const system = firstOf(SYSTEMS, userAgent)
  if (browser) return system ? `${browser} on ${system}` : browser
  if (system) return `A browser on ${system}`
  return userAgent.trim().slice(0, 40) || 'Unknown program'
}
