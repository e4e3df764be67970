import { Validator } from '@seriousme/openapi-schema-validator'
import { expect, it } from 'vitest'
import { filesOf } from '../meta/files'
import { useApp } from '../support/app'

const app = useApp()

/** Routes with formats of their own: the sign-in package's. */
const OWN_FORMAT = /^server\/api\/auth\//

/** What a route's file answers to, as OpenAPI writes it. */
function operationOf(file: string): string {
  const [, where, method] = /^server\/api\/(.*)\.(get|post|put|patch|delete)\.ts$/.exec(file)!
  const path = `/api/${where!}`.replace(/\/index$/, '').replace(/\[(?:\.\.\.)?(\w+)\]/g, '{$1}')
  return `${method} ${path}`
}

it('the interface is described in a valid OpenAPI 3.1 document', async () => {
  const { body, status } = await app.visitor.get('/api/openapi.json')
  expect(status).toBe(200)
  expect(body.openapi).toBe('3.1.0')
  expect(await new Validator().validate(body)).toMatchObject({ valid: true })
})

it('every route of the program is in it, and nothing else', async () => {
  const { body } = await app.visitor.get('/api/openapi.json')
  const described = Object.entries(body.paths as Record<string, object>).flatMap(([path, methods]) => Object.keys(methods).map(method => `${method} ${path}`))
  const files = filesOf(['.ts']).filter(file => /^server\/api\/.*\.(get|post|put|patch|delete)\.ts$/.test(file) && !OWN_FORMAT.test(file))
  expect(described.sort()).toEqual(files.map(operationOf).sort())
})

it('the routes of the contract are in it with what they ask for', async () => {
  const { paths } = (await app.visitor.get('/api/openapi.json')).body
  const asked = (operation: { parameters?: { name: string }[] }) => (operation.parameters ?? []).map(one => one.name)
  expect(asked(paths['/api/records'].get)).toEqual(expect.arrayContaining(['category', 'species', 'district', 'method', 'from', 'to', 'minNet', 'q', 'sort', 'limit', 'cursor']))
  for (const [path, method] of [
    ['/api/records/{recordNo}', 'get'], ['/api/records.csv', 'get'], ['/api/categories', 'get'], ['/api/scores', 'post'], ['/api/health', 'get'], ['/api/entries', 'post'],
    ['/api/entries/{id}', 'get'], ['/api/entries/{id}', 'patch'], ['/api/entries/{id}/sheet', 'put'], ['/api/entries/{id}/transitions', 'post'], ['/api/entries/{id}/events', 'get'],
  ] as const) expect(paths[path]?.[method], `${method} ${path}`).toBeDefined()
  expect(paths['/api/scores'].post.requestBody.content['application/json'].schema.required).toEqual(expect.arrayContaining(['category', 'measurements']))
  expect(asked(paths['/api/entries/{id}'].patch)).toContain('if-match')
})
