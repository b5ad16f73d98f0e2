import { fileURLToPath } from 'node:url'

const at = (path: string) => fileURLToPath(new URL(path, import.meta.url))

export default defineNuxtConfig({
  modules: ['@nuxt/eslint', '@nuxtjs/tailwindcss', '@pinia/nuxt', '@sidebase/nuxt-auth', 'nuxt-security'],
  components: [{ path: '~/components', pathPrefix: false }],
  devtools: { enabled: false },

  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      titleTemplate: '%s · Holdtime',
      meta: [
        { name: 'viewport', content: 'width=device-width, initial-scale=1' },
        { name: 'color-scheme', content: 'light dark' },
      ],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/mark.svg' }],
    },
  },
  dir: { app: 'app' },

  srcDir: '.',
  // Server sources are compiled by Nitro, not scanned as pages or components.
  ignore: ['tests/**', 'scripts/**', '.ci/**'],

  // The session is read on every server request, so routes behind it are never cached by a proxy.
  routeRules: {
    '/api/**': { headers: { 'cache-control': 'no-store' } },
  },

  experimental: {
    // Pages are fetched ahead when a link is pointed at, not when it is seen: the rail shows a dozen links on every page.
    defaults: { nuxtLink: { prefetchOn: { visibility: false, interaction: true } } },
  },

  compatibilityDate: '2026-03-01',

  nitro: {
    serverAssets: [
      { baseName: 'migrations', dir: at('./drizzle') },
      { baseName: 'fonts', dir: at('./assets/fonts') },
    ],
    typescript: { tsConfig: { compilerOptions: { noUncheckedIndexedAccess: true } } },
  },

  vite: {
    optimizeDeps: { include: ['v-calendar', 'vee-validate', '@vee-validate/zod', 'zod', 'date-fns', '@date-fns/tz', 'd3-scale', 'd3-shape', 'papaparse', 'ml-matrix'] },
  },

  typescript: {
    strict: true,
    tsConfig: { compilerOptions: { noUncheckedIndexedAccess: true } },
  },

  telemetry: false,

  auth: {
    // Only its path is used; the module insists on an origin before our configuration is read.
    baseURL: 'http://localhost/api/auth',
    provider: { type: 'authjs', addDefaultCallbackUrl: true },
    globalAppMiddleware: { isEnabled: true },
    sessionRefresh: { enablePeriodically: false, enableOnWindowFocus: true },
  },

  eslint: { config: { stylistic: { quotes: 'single', semi: false, indent: 2, commaDangle: 'always-multiline', braceStyle: 'stroustrup' } } },

  security: {
    // Body limits, rate limits and origin checks are our own (server/middleware/3.limits.ts); the module sets headers and the nonce.
    xssValidator: false,
    corsHandler: false,
    rateLimiter: false,
    requestSizeLimiter: false,
    removeLoggers: false,
    nonce: true,
    headers: {
      contentSecurityPolicy: {
        'default-src': ['\'self\''],
        'base-uri': ['\'none\''],
        'connect-src': ['\'self\''],
        'font-src': ['\'self\''],
        'form-action': ['\'self\''],
        'frame-ancestors': ['\'none\''],
        'frame-src': ['\'none\''],
        'img-src': ['\'self\'', 'data:', 'blob:'],
        'manifest-src': ['\'self\''],
        'media-src': ['\'none\''],
        'object-src': ['\'none\''],
        'script-src': ['\'self\'', '\'nonce-{{nonce}}\'', '\'strict-dynamic\''],
        'script-src-attr': ['\'none\''],
        'style-src': ['\'self\'', '\'unsafe-inline\''],
        'style-src-attr': ['\'unsafe-inline\''],
        'worker-src': ['\'self\'', 'blob:'],
        'upgrade-insecure-requests': false,
      },
      referrerPolicy: 'strict-origin-when-cross-origin',
      strictTransportSecurity: { maxAge: 31536000, includeSubdomains: true },
      crossOriginEmbedderPolicy: false,
      permissionsPolicy: { 'camera': [], 'geolocation': [], 'microphone': [], 'display-capture': [] },
    },
  },

  tailwindcss: { cssPath: '~/assets/css/main.css', configPath: 'tailwind.config.ts', viewer: false },
})
