import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url))
/** Rooms of the desk are loaded by the desk alone, so that a public page does not carry their texts. */
const deskRooms = new Set(['account', 'entry', 'bench', 'office', 'panel', 'registrar', 'desk', 'notices', 'payments', 'people', 'mailbox'])
const publicRooms = readdirSync(here('./i18n/locales/en'))
  .filter(file => file.endsWith('.json') && !deskRooms.has(file.replace('.json', '')))
  .sort()

export default defineNuxtConfig({
  modules: ['@nuxtjs/tailwindcss', '@pinia/nuxt', '@nuxtjs/i18n', '@sidebase/nuxt-auth', '@nuxt/eslint'],
  components: [{ path: '~/components', pathPrefix: true }],
  devtools: { enabled: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      viewport: 'width=device-width, initial-scale=1',
      link: [
        { rel: 'icon', type: 'image/svg+xml', href: '/favicon.svg' },
      ],
      meta: [
        { name: 'color-scheme', content: 'light dark' },
        { name: 'theme-color', content: '#F6F1E7', media: '(prefers-color-scheme: light)' },
        { name: 'theme-color', content: '#15181A', media: '(prefers-color-scheme: dark)' },
      ],
    },
  },
  css: ['~/assets/css/fonts.css'],
  srcDir: '.',
  // Said aloud: left out, a build goes to a cache folder in node_modules as soon as .nuxt exists.
  buildDir: '.nuxt',
  ignore: ['.data/**', 'tests/**', 'db/**', 'seeds/**', 'scripts/**', 'docs/**'],
  routeRules: {
    '/_nuxt/**': { headers: { 'cache-control': 'public, max-age=31536000, immutable' } },
  },
  features: { inlineStyles: false },
  experimental: { checkOutdatedBuildInterval: false },
  compatibilityDate: '2026-11-01',
  nitro: {
    compressPublicAssets: true,
    esbuild: { options: { target: 'node20' } },
  },
  // Nothing is written into a style sheet as data: the policy lets fonts come from our own address alone.
  vite: { build: { target: 'es2022', assetsInlineLimit: 0 } },
  typescript: { strict: true, typeCheck: false, tsConfig: { compilerOptions: { noUncheckedIndexedAccess: true } } },
  telemetry: false,
  hooks: {
    // The sign-in module's client asks for the session on every page; we ask at `/api/me`, and only where it is needed.
    'app:resolve': (app) => { app.plugins = app.plugins.filter(plugin => !/nuxt-auth\/dist\/runtime\/plugin(?:\.js)?$/.test(plugin.src)) },
    // Ours answers for the API and leaves pages to Nuxt's own.
    'nitro:config': (config) => { config.errorHandler = [here('./server/error.ts'), ...[config.errorHandler ?? []].flat()] },
  },
  auth: {
    // The session is read on our own side, page by page: public pages never ask for one on the server.
    disableServerSideAuth: true,
    originEnvKey: 'AUTH_ORIGIN',
    provider: { type: 'authjs', trustHost: false, defaultProvider: 'credentials', addDefaultCallbackUrl: false },
    sessionRefresh: { enablePeriodically: false, enableOnWindowFocus: false },
    globalAppMiddleware: false,
  },
  eslint: { config: { stylistic: true } },
  i18n: {
    strategy: 'prefix_except_default',
    defaultLocale: 'en',
    langDir: 'locales',
    locales: [{ code: 'en', language: 'en-US', name: 'English', files: publicRooms.map(file => `en/${file}`) }],
    detectBrowserLanguage: false,
    compilation: { strictMessage: false },
  },
  tailwindcss: { viewer: false, cssPath: '~/assets/css/main.css' },
})
