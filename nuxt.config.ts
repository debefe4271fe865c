import { randomUUID } from 'node:crypto'
import { cp } from 'node:fs/promises'
import { join } from 'node:path'
import { SHELL_PATH, SHELL_ROUTES } from './shared/shell-routes'

export default defineNuxtConfig({
  modules: ['@nuxt/eslint', '@nuxtjs/tailwindcss', '@pinia/nuxt', '@sidebase/nuxt-auth', '@vite-pwa/nuxt'],
  // Component names follow their file, not their folder: <UiButton> lives in components/ui/UiButton.vue.
  components: [{ path: '~/components', pathPrefix: false }],
  imports: { dirs: ['queries', 'stores', 'offline'] },
  devtools: { enabled: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      title: 'Holdover',
      meta: [
        { name: 'viewport', content: 'width=device-width, initial-scale=1, viewport-fit=cover' },
        { name: 'description', content: 'Plan, run and record a refrigeration controller\'s time out of service.' },
        { name: 'theme-color', content: '#F4EFE3' },
      ],
      link: [
        { rel: 'icon', type: 'image/svg+xml', href: '/mark.svg' },
        { rel: 'apple-touch-icon', href: '/icons/mark-180.png' },
        { rel: 'manifest', href: '/manifest.webmanifest' },
      ],
    },
  },
  css: ['~/assets/css/main.css'],
  runtimeConfig: {
    authSecret: '', // NUXT_AUTH_SECRET
    databaseUrl: '', // NUXT_DATABASE_URL, set from DATABASE_URL by the start command
    dataDir: '', // NUXT_DATA_DIR, from HOLDOVER_DATA
  },
  routeRules: {
    // The run is a shell without data; it folds the log that it fetches and the one kept on the phone.
    ...Object.fromEntries(SHELL_ROUTES.flatMap(route => [[route, { ssr: false }], [`${route}/**`, { ssr: false }]])),
  },
  compatibilityDate: '2026-01-01',
  nitro: {
    // pdfkit reads .woff; only the files that the record's PDF is set in.
    serverAssets: [
      { baseName: 'fonts', dir: '../node_modules/@fontsource/ibm-plex-sans/files', pattern: 'ibm-plex-sans-{latin,latin-ext,cyrillic,greek,vietnamese}-{400,600,700}-normal.woff' },
      { baseName: 'mono', dir: '../node_modules/@fontsource/ibm-plex-mono/files', pattern: 'ibm-plex-mono-latin-400-normal.woff' },
    ],
    hooks: {
      // Migrations are read at start, not bundled: they travel beside the server.
      async compiled(nitro) {
        await cp(join(nitro.options.rootDir, 'server/database/migrations'), join(nitro.options.output.serverDir, 'migrations'), { recursive: true })
      },
    },
    experimental: { asyncContext: true },
  },
  typescript: { strict: true },
  telemetry: false,
  auth: {
    originEnvKey: 'AUTH_ORIGIN',
    provider: { type: 'authjs', defaultProvider: 'credentials', addDefaultCallbackUrl: true },
    // Every page is closed unless it says `auth: false`; the API guards itself again (server/middleware).
    globalAppMiddleware: { isEnabled: true, allow404WithoutAuth: true, addDefaultCallbackUrl: true },
    sessionRefresh: { enablePeriodically: false, enableOnWindowFocus: false },
  },
  eslint: { config: { stylistic: { semi: false, quotes: 'single', commaDangle: 'always-multiline', braceStyle: '1tbs' } } },
  // The worker is built as holdover-worker.js and served as /sw.js (server/routes), where it can be switched off.
  pwa: {
    strategies: 'injectManifest',
    srcDir: 'service-worker',
    filename: 'holdover-worker.ts',
    injectRegister: false,
    client: { registerPlugin: false },
    injectManifest: {
      globPatterns: ['_nuxt/**/*.{js,css,woff2}', 'mark.svg', 'icons/*.png'],
      // The shell is fetched from the running server at each new build, with the policy that belongs to it.
      additionalManifestEntries: [{ url: SHELL_PATH, revision: randomUUID() }],
    },
    manifest: {
      id: '/',
      name: 'Holdover',
      short_name: 'Holdover',
      description: 'Plan, run and record a refrigeration controller\'s time out of service.',
      lang: 'en',
      start_url: '/',
      scope: '/',
      display: 'standalone',
      background_color: '#F4EFE3',
      theme_color: '#F4EFE3',
      icons: [
        { src: '/icons/mark-192.png', sizes: '192x192', type: 'image/png' },
        { src: '/icons/mark-512.png', sizes: '512x512', type: 'image/png' },
        { src: '/icons/mark-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
      ],
    },
  },
  // One style sheet holds Tailwind's layers; without this the module would add its own beside it.
  tailwindcss: { cssPath: '~/assets/css/main.css', viewer: false },
})
