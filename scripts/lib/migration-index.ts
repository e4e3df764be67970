/** The text of db/migrations/index.ts for these file names. */
export function migrationIndex(files: readonly string[]): string {
  const names = files.filter(file => /^\d{4}_\w+\.ts$/.test(file)).map(file => file.slice(0, -3)).sort()
  return [
    '// Made by scripts/db-migrations.ts; run `npm run db:index` after adding a migration.',
    'import type { Step as Migration } from \'../columns\'',
    ...names.map(name => `import * as m${name} from './${name}'`),
    '',
    'export type { Migration }',
    '',
    '/** Every migration by its name, in the order in which they run. */',
    'export const MIGRATIONS: readonly (readonly [name: string, migration: Migration])[] = [',
    ...names.map(name => `  ['${name}', m${name}],`),
    ']',
    '',
  ].join('\n')
}
