import { chunkOf, modernDexie, zodWithoutJsonSchema } from './app/browser-chunks'
import { bundleReport } from './tests/bench/bundle-report'

// Lapel's one configuration. The reasons for the odd lines stand in DEVELOPERS.md, "Known surprises".
export default defineNuxtConfig({
  modules: [
    '@pinia/nuxt',
    '@nuxtjs/tailwindcss',
    'nuxt-auth-utils',
    'nuxt-security',
    '@vite-pwa/nuxt',
  ],
  devtools: { enabled: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      title: 'Lapel',
      viewport: 'width=device-width, initial-scale=1, viewport-fit=cover',
      link: [
        { rel: 'icon', href: '/icon.svg', type: 'image/svg+xml' },
        { rel: 'apple-touch-icon', href: '/apple-touch-icon.png' },
      ],
      meta: [{ name: 'theme-color', content: '#FAF8F3' }],
    },
  },
  css: [
    '@fontsource/atkinson-hyperlegible/latin-400.css',
    '@fontsource/atkinson-hyperlegible/latin-700.css',
    '@fontsource/atkinson-hyperlegible/latin-ext-400.css',
    '@fontsource/atkinson-hyperlegible/latin-ext-700.css',
  ],
  runtimeConfig: {
    databaseUrl: '',
    demo: '',
    session: {
      name: '__Host-sid',
      password: '',
      maxAge: 60 * 60 * 24 * 30,
      cookie: { secure: true, httpOnly: true, sameSite: 'lax', path: '/' },
    },
  },
  routeRules: {
    '/field': { ssr: false, prerender: true },
    '/field/**': { ssr: false },
    '/api/**': { headers: { 'cache-control': 'no-store', 'content-security-policy': 'default-src \'none\'; frame-ancestors \'none\'' } },
    '/office/**': { headers: { 'cache-control': 'no-store' } },
    '/sign-in': { headers: { 'cache-control': 'no-store' } },
    '/sw.js': { headers: { 'cache-control': 'no-cache' } },
  },
  experimental: { payloadExtraction: false, emitRouteChunkError: 'manual' },
  compatibilityDate: '2026-12-01',
  nitro: {
    typescript: { tsConfig: { include: ['../drizzle/**/*', '../tests/server/**/*'] } },
  },
  vite: {
    // Every component here is written with `setup`; Vue's other way of writing them stays out of the phone.
    define: { __VUE_OPTIONS_API__: 'false' },
    build: { minify: 'terser', terserOptions: { ecma: 2020, module: true, compress: { passes: 2 } }, rollupOptions: { output: { manualChunks: chunkOf, chunkFileNames: '_nuxt/[name].[hash].js' } } },
  },
  typescript: {
    strict: true,
    nodeTsConfig: { include: ['../*.config.ts', '../tests/*.mjs', '../tests/e2e/**/*', '../tests/bench/**/*', '../tests/screens/**/*', '../app/browser-chunks.ts'] },
    sharedTsConfig: { include: ['../tests/unit/**/*', '../tests/fixtures/**/*'] },
  },
  hooks: {
    'vite:extendConfig': (config, { isClient }) => {
      if (isClient) config.plugins?.push(bundleReport('.nuxt/browser-bundle.json'), modernDexie(), zodWithoutJsonSchema())
    },
    // A phone must not fetch the office ahead of time: the service worker brings what the field needs.
    'build:manifest': (manifest) => {
      for (const item of Object.values(manifest)) {
        item.prefetch = false
        item.dynamicImports = []
      }
    },
  },
  auth: {
    // The field never waits for a session call; the office fetches it in its middleware.
    loadStrategy: 'none',
    hash: { scrypt: { cost: 131072, blockSize: 8, parallelization: 1, maxMemory: 150994944 } },
  },
  pwa: {
    registerType: 'prompt',
    manifest: {
      id: '/field',
      name: 'Lapel',
      short_name: 'Lapel',
      description: 'Field book for workplace air sampling',
      lang: 'en',
      start_url: '/field',
      scope: '/',
      display: 'standalone',
      background_color: '#FAF8F3',
      theme_color: '#FAF8F3',
      icons: [
        { src: '/icon-192.png', sizes: '192x192', type: 'image/png' },
        { src: '/icon-512.png', sizes: '512x512', type: 'image/png' },
        { src: '/icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
      ],
    },
    workbox: {
      globPatterns: ['**/*.{js,css,html,svg,png,woff2}'],
      // Phones never load the office.
      globIgnores: ['**/office.*'],
      navigateFallback: '/field',
      navigateFallbackAllowlist: [/^\/field(\/|$)/],
      navigateFallbackDenylist: [/^\/api\//],
      cleanupOutdatedCaches: true,
    },
    client: { installPrompt: true },
  },
  security: {
    corsHandler: false,
    rateLimiter: false,
    requestSizeLimiter: false,
    xssValidator: false,
    nonce: true,
    sri: false,
    headers: {
      crossOriginEmbedderPolicy: false,
      referrerPolicy: 'no-referrer',
      contentSecurityPolicy: {
        'default-src': ['\'none\''],
        'script-src': ['\'self\'', '\'nonce-{{nonce}}\''],
        'script-src-attr': ['\'none\''],
        'style-src': ['\'self\'', '\'unsafe-inline\''],
        'img-src': ['\'self\'', 'blob:', 'data:'],
        'media-src': ['\'self\'', 'blob:'],
        'connect-src': ['\'self\''],
        'worker-src': ['\'self\''],
        'manifest-src': ['\'self\''],
        'font-src': ['\'self\''],
        'object-src': ['\'none\''],
        'base-uri': ['\'none\''],
        'form-action': ['\'self\''],
        'frame-ancestors': ['\'none\''],
        'upgrade-insecure-requests': false,
      },
      permissionsPolicy: {
        'camera': ['self'],
        'screen-wake-lock': ['self'],
        // No desktop browser knows it and each one complains of it; the app shares no page.
        'web-share': false,
        'publickey-credentials-get': ['self'],
        'publickey-credentials-create': ['self'],
        'geolocation': [],
        'microphone': [],
        'display-capture': [],
        'fullscreen': [],
      },
    },
  },
  tailwindcss: { cssPath: '~/assets/css/tailwind.css', viewer: false },
})
