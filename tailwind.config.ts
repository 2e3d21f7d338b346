import type { Config } from 'tailwindcss'
import plugin from 'tailwindcss/plugin'
import { lightColours, lightHues, themeVariables } from './assets/css/tokens'

const asVariables = (names: string[], prefix = '') =>
  Object.fromEntries(names.map((name) => [name, `var(--${prefix}${name})`]))

/** Who asks the system for more contrast gets it with every theme but one chosen for its own contrast. */
const MORE_CONTRAST = ['(prefers-contrast: more)', '(forced-colors: active)']
const withContrast = (and = '') => `@media ${MORE_CONTRAST.map((asked) => `screen and ${asked}${and}`).join(', ')}`
const DARK = '(prefers-color-scheme: dark)'

/** The system decides, `data-theme` on <html> overrides, paper is always light. */
const themes = plugin(({ addBase }) => {
  addBase({
    ':root': themeVariables('light'),
    [`@media screen and ${DARK}`]: { ':root:not([data-theme])': themeVariables('dark') },
    '@media screen': { ":root[data-theme='dark']": themeVariables('dark') },
  })
  addBase({
    [withContrast()]: {
      ":root:not([data-theme]), :root[data-theme='light']": themeVariables('contrast-light'),
      ":root[data-theme='dark']": themeVariables('contrast-dark'),
    },
    [withContrast(` and ${DARK}`)]: { ':root:not([data-theme])': themeVariables('contrast-dark') },
    '@media screen': {
      ":root[data-theme='contrast-light']": themeVariables('contrast-light'),
      ":root[data-theme='contrast-dark']": themeVariables('contrast-dark'),
    },
  })
})

export default {
  content: ['./components/**/*.vue', './layouts/**/*.vue', './pages/**/*.vue', './app.vue', './error.vue'],
  theme: {
    screens: { md: '720px', rail: '920px', lg: '1100px', xl: '1440px' },
    colors: {
      transparent: 'transparent',
      current: 'currentColor',
      ...asVariables(Object.keys(lightColours)),
      hue: asVariables(Object.keys(lightHues), 'hue-'),
    },
    fontFamily: {
      sans: ['"IBM Plex Sans"', 'ui-sans-serif', 'system-ui', 'sans-serif'],
      mono: ['"IBM Plex Mono"', 'ui-monospace', 'monospace'],
    },
    fontSize: {
      title: ['1.875rem', { lineHeight: '2.25rem', letterSpacing: '-0.018em', fontWeight: '400' }],
      number: ['1.625rem', { lineHeight: '2.25rem', fontWeight: '400' }],
      facts: ['1.125rem', { lineHeight: '1.5rem', fontWeight: '500' }],
      head: ['1rem', { lineHeight: '1.375rem', fontWeight: '600' }],
      body: ['0.875rem', '1.3125rem'],
      table: ['0.8125rem', '1.125rem'],
      small: ['0.75rem', '1.0625rem'],
    },
    borderRadius: { none: '0', DEFAULT: '2px', full: '9999px' },
    boxShadow: { none: 'none' },
    borderColor: { DEFAULT: 'var(--rule)', ...asVariables(Object.keys(lightColours)), transparent: 'transparent' },
    extend: {
      maxWidth: { main: '65rem', page: '82rem', prose: '40rem' },
      spacing: { rail: '11.5rem', remarks: '14.75rem', head: '3rem' },
      transitionDuration: { DEFAULT: '120ms' },
    },
  },
  plugins: [themes],
} satisfies Config
