import { fileURLToPath } from 'node:url'
import { defineNuxtConfig } from 'nuxt/config'

const cache = (path: string) => fileURLToPath(new URL(`../../../.cache/bare/${path}`, import.meta.url))

/**
 * The least that Nuxt can answer with: one query, and the same fifty lines in a plain table. What our lists cost is said
 * beside it, so these routes stay as they are.
 */
export default defineNuxtConfig({
  devtools: { enabled: false },
  srcDir: '.',
  buildDir: cache('nuxt'),
  features: { inlineStyles: false },
  experimental: { checkOutdatedBuildInterval: false },
  compatibilityDate: '2026-11-01',
  nitro: { output: { dir: cache('output') } },
  vite: { build: { target: 'es2022' } },
  telemetry: false,
})
