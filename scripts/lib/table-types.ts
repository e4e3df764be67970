import type { Knex } from 'knex'

interface Column {
  table: string
  name: string
  dataType: string
  columnType: string
  nullable: 'YES' | 'NO'
  default: string | null
  extra: string
  expression: string | null
}

interface Check {
  table: string
  clause: string
}

const pascal = (name: string) => name.replace(/(?:^|_)(\w)/g, (_, letter: string) => letter.toUpperCase())
const property = (name: string) => /^[a-z_]\w*$/.test(name) ? name : `'${name}'`

/** The union of a CHECK such as `state` in ('a','b'), by column. */
function closedLists(checks: readonly Check[]): Map<string, string> {
  const lists = new Map<string, string>()
  for (const { table, clause } of checks) {
    const match = /^`(\w+)` in \(((?:'[^']*',?)+)\)$/.exec(clause.trim())
    if (match) lists.set(`${table}.${match[1]!}`, match[2]!.split(',').join(' | '))
  }
  return lists
}

function typeOf(column: Column, lists: ReadonlyMap<string, string>): string {
  const list = lists.get(`${column.table}.${column.name}`)
  if (list) return list
  if (column.columnType === 'tinyint(1)') return '0 | 1'
  return /int|decimal|double|float/.test(column.dataType) ? 'number' : 'string'
}

/**
 * The text of db/tables.d.ts for the schema of this database: a row, what an insert needs and what an update may
 * give, for every table; columns under a CHECK over a closed list as unions.
 */
export async function tableTypes(db: Knex): Promise<string> {
  const columns = await db('information_schema.columns as c')
    .whereRaw('c.table_schema = database()').whereNot('c.table_name', 'like', 'schema\\_migrations%')
    .orderBy(['c.table_name', 'c.ordinal_position'])
    .select<Column[]>({
      table: 'c.table_name', name: 'c.column_name', dataType: 'c.data_type', columnType: 'c.column_type',
      nullable: 'c.is_nullable', default: 'c.column_default', extra: 'c.extra', expression: 'c.generation_expression',
    })
  const checks = await db('information_schema.check_constraints')
    .whereRaw('constraint_schema = database()')
    .select<Check[]>({ table: 'table_name', clause: 'check_clause' })
  const lists = closedLists(checks)
  const byTable = groupBy(columns)

  const lines = [
    '// Made by scripts/db-types.ts from the migrated schema; run `npm run db:types` after adding a migration.',
    'import type { Knex } from \'knex\'',
    '',
    'type Given<T> = { [K in keyof T]: T[K] | Knex.Raw }',
  ]
  for (const [table, own] of byTable) {
    lines.push('', `export interface ${pascal(table)}Row {`)
    for (const column of own) {
      lines.push(`  ${property(column.name)}: ${typeOf(column, lists)}${column.nullable === 'YES' ? ' | null' : ''}`)
    }
    lines.push('}', '', `export interface ${pascal(table)}Insert {`)
    for (const column of own) {
      if (column.expression) continue
      const optional = column.nullable === 'YES' || column.default !== null || column.extra.includes('auto_increment')
      const type = typeOf(column, lists)
      lines.push(`  ${property(column.name)}${optional ? '?' : ''}: ${type === '0 | 1' ? 'boolean | 0 | 1' : type}${column.nullable === 'YES' ? ' | null' : ''}`)
    }
    lines.push('}')
  }
  lines.push('', 'declare module \'knex/types/tables\' {', '  interface Tables {')
  for (const table of byTable.keys()) {
    const name = pascal(table)
    lines.push(`    ${table}: Knex.CompositeTableType<${name}Row, Given<${name}Insert>, Partial<Given<${name}Insert>>>`)
  }
  lines.push('  }', '}', '')
  return lines.join('\n')
}

function groupBy(columns: readonly Column[]): Map<string, Column[]> {
  const groups = new Map<string, Column[]>()
  for (const column of columns) {
    const group = groups.get(column.table)
    if (group) group.push(column)
    else groups.set(column.table, [column])
  }
  return groups
}
