import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

/** The pure rules alone, for mutation testing: no server, no database, and a few sheets of every class for the oracle. */
export default defineConfig({
  root: fileURLToPath(new URL('../..', import.meta.url)),
  esbuild: { tsconfigRaw: JSON.stringify({ compilerOptions: { target: 'es2022', useDefineForClassFields: true } }) },
  test: { include: ['tests/unit/**/*.test.ts', 'tests/standards/**/*.test.ts'], exclude: ['tests/unit/**/*.db.test.ts'], env: { HARTROLL_ORACLE_SHEETS: '20' }, environment: 'node' },
})
