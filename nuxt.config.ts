import { env } from 'node:process'

const isHttps = (env.NUXT_PUBLIC_BASE_URL ?? '').startsWith('https:')

export default defineNuxtConfig({
  modules: [
    '@nuxt/eslint',
    '@nuxtjs/tailwindcss',
    '@pinia/nuxt',
    '@vueuse/nuxt',
    '@nuxt/icon',
    'nuxt-auth-utils',
    'nuxt-security',
  ],
  components: [{ path: '~/components', pathPrefix: false }],
  imports: { dirs: ['composables', 'stores'] },
  devtools: { enabled: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en-GB' },
      titleTemplate: '%s · Knurl',
      meta: [
        { name: 'viewport', content: 'width=device-width, initial-scale=1' },
        { name: 'color-scheme', content: 'light dark' },
      ],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/icon.svg' }],
    },
  },
  css: ['~/assets/css/main.css'],
  runtimeConfig: {
    databaseUrl: '',
    /** Where photos and documents live when no object store is configured. */
    filesDir: '.data/files',
    s3: { bucket: '', endpoint: '', region: '', accessKeyId: '', secretAccessKey: '' },
    /** Empty: take the client's address from the socket. `x-forwarded-for`: trust the reverse proxy in front. */
    trustedProxyHeader: '',
    session: { name: 'knurl-session', password: '', maxAge: 60 * 60 * 24 * 14 },
    public: {
      /** What a label's QR code starts with. Empty: the address the request came to. */
      baseUrl: '',
    },
  },
  srcDir: '.',
  // Else a second production build goes under node_modules/.cache.
  buildDir: '.nuxt',
  // Nuxt 4's behaviour on the newest line that runs on Node 20, so that the later move is small.
  future: { compatibilityVersion: 4 },
  compatibilityDate: '2026-11-01',
  nitro: {
    compressPublicAssets: true,
    experimental: { tasks: false },
  },
  // A label's code holds its address in capitals, which makes it smaller.
  serverHandlers: [{ route: '/S/:tag', method: 'get', handler: '~/server/routes/s/[tag].get.ts' }],
  vite: {
    build: { target: 'es2022' },
  },
  typescript: { strict: true, typeCheck: false },
  telemetry: false,
  hooks: {
    // A megabyte that only the camera needs: fetched when it is opened, by no other page.
    'build:manifest': (manifest) => {
      for (const resource of Object.values(manifest)) {
        if (resource.file?.endsWith('.wasm')) Object.assign(resource, { prefetch: false, preload: false })
      }
    },
  },
  // `/api/me` says who is signed in, after asking the database; the module's own look at the cookie would come on top.
  auth: { loadStrategy: 'none' },
  eslint: {
    config: {
      stylistic: { semi: false, quotes: 'single', commaDangle: 'always-multiline', braceStyle: '1tbs' },
    },
  },
  icon: {
    provider: 'server',
    serverBundle: { collections: ['lucide'] },
    clientBundle: { scan: true },
    fallbackToApi: false,
    mode: 'svg',
  },
  security: {
    corsHandler: false,
    removeLoggers: false,
    rateLimiter: false,
    xssValidator: false,
    requestSizeLimiter: false,
    headers: {
      crossOriginEmbedderPolicy: false,
      referrerPolicy: 'same-origin',
      permissionsPolicy: { camera: ['self'] },
      strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubdomains: false } : false,
      contentSecurityPolicy: {
        'default-src': ['\'self\''],
        'script-src': ['\'self\'', '\'nonce-{{nonce}}\'', '\'strict-dynamic\'', '\'wasm-unsafe-eval\''],
        'style-src': ['\'self\'', '\'nonce-{{nonce}}\''],
        'style-src-attr': ['\'unsafe-inline\''],
        'worker-src': ['\'self\''],
        'img-src': ['\'self\'', 'data:', 'blob:'],
        'media-src': ['\'self\'', 'blob:'],
        'font-src': ['\'self\''],
        'connect-src': ['\'self\''],
        'manifest-src': ['\'self\''],
        'object-src': ['\'none\''],
        'base-uri': ['\'none\''],
        'form-action': ['\'self\''],
        'frame-ancestors': ['\'none\''],
        'upgrade-insecure-requests': isHttps,
      },
    },
  },
})
