export default defineNuxtConfig({
  compatibilityDate: '2026-05-01',
  srcDir: '.',
  devtools: { enabled: false },
  telemetry: false,
  modules: ['@nuxt/eslint', '@nuxtjs/tailwindcss', '@pinia/nuxt', 'nuxt-auth-utils'],
  components: [{ path: '~/components', pathPrefix: true }],
  // What the pages need of a session comes from GET /api/session.
  auth: { loadStrategy: 'none' },
  css: [
    '@fontsource/ibm-plex-sans/latin-400.css',
    '@fontsource/ibm-plex-sans/latin-500.css',
    '@fontsource/ibm-plex-sans/latin-600.css',
    '@fontsource/ibm-plex-sans/latin-400-italic.css',
    '@fontsource/ibm-plex-sans/greek-400.css',
    '@fontsource/ibm-plex-sans/greek-500.css',
    '@fontsource/ibm-plex-sans/greek-600.css',
    '@fontsource/ibm-plex-mono/latin-400.css',
    '@fontsource/ibm-plex-mono/latin-500.css',
    '@fontsource/ibm-plex-mono/latin-600.css',
  ],
  tailwindcss: { cssPath: '~/assets/css/main.css', viewer: false },
  eslint: { config: { stylistic: false } },
  ignore: ['.data/**', '.data-*/**', '.bench/**', 'coverage/**', 'screens/**', 'docs/**', 'bench/**', 'tests/**'],
  // Code of a linked page is fetched when the link is pointed at or focused, not as soon as it is seen.
  experimental: { defaults: { nuxtLink: { prefetchOn: { visibility: false, interaction: true } } } },
  hooks: {
    // What may be needed later, such as a dialog, is fetched when it is, not in the wake of every page.
    'build:manifest'(manifest) {
      for (const file of Object.values(manifest)) if (file.resourceType === 'script') file.prefetch = false
    },
  },
  runtimeConfig: { session: { cookie: { secure: true } } },
  routeRules: {
    '/**': {
      headers: {
        'x-content-type-options': 'nosniff',
        'x-frame-options': 'DENY',
        'referrer-policy': 'same-origin',
        'cross-origin-opener-policy': 'same-origin',
      },
    },
    '/api/**': { headers: { 'cache-control': 'no-store' } },
  },
  nitro: { esbuild: { options: { target: 'es2022' } } },
  typescript: {
    strict: true,
    tsConfig: { compilerOptions: { noUncheckedIndexedAccess: true } },
    sharedTsConfig: { compilerOptions: { lib: ['ESNext'] } },
  },
  app: {
    head: {
      title: 'Espalier',
      htmlAttrs: { lang: 'en' },
      meta: [{ name: 'viewport', content: 'width=device-width, initial-scale=1' }],
    },
  },
})
