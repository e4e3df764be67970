import { fileURLToPath } from 'node:url'
import { defineConfig, type TestProjectConfiguration } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))

/** Folders of tests that need a database; they share one server, started by their global set-up. */
const DATABASE = './tests/support/globalSetup.ts'

interface Group {
  readonly name: string
  readonly order: number
  readonly globalSetup?: string
  readonly testTimeout: number
}

const GROUPS: readonly Group[] = [
  { name: 'meta', order: 0, testTimeout: 60_000 },
  { name: 'unit', order: 0, testTimeout: 20_000 },
  { name: 'standards', order: 0, testTimeout: 120_000 },
  { name: 'db', order: 1, globalSetup: DATABASE, testTimeout: 30_000 },
  { name: 'api', order: 2, globalSetup: DATABASE, testTimeout: 30_000 },
  { name: 'browser', order: 3, globalSetup: DATABASE, testTimeout: 120_000 },
]

export default defineConfig({
  root,
  // The project's own tsconfig refers to files that Nuxt generates; tests shall run without them.
  esbuild: { tsconfigRaw: JSON.stringify({ compilerOptions: { target: 'es2022', useDefineForClassFields: true } }) },
  resolve: {
    alias: { '~~': root, '@@': root, '~': root, '@': root },
  },
  test: {
    maxWorkers: 2,
    projects: GROUPS.map(({ name, order, globalSetup, testTimeout }): TestProjectConfiguration => ({
      extends: true,
      test: {
        name,
        include: [`tests/${name}/**/*.test.ts`],
        environment: 'node',
        pool: 'forks',
        testTimeout,
        hookTimeout: 120_000,
        sequence: { groupOrder: order },
        ...(globalSetup ? { globalSetup } : {}),
      },
    })),
  },
})
