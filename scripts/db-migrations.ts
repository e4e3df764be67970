/**
 * Writes db/migrations/index.ts from the files in that folder: `npm run db:index`. The list is in code so that
 * bundles carry it.
 */
import { readdirSync, writeFileSync } from 'node:fs'
import { migrationIndex } from './lib/migration-index'

const folder = new URL('../db/migrations/', import.meta.url)
writeFileSync(new URL('index.ts', folder), migrationIndex(readdirSync(folder)))
