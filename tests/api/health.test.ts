import { expect, test } from 'vitest'
import { latest } from '../../db/migrate'
import { useApp } from '../support/app'

const app = useApp()

test('without a worker the health is 503 and says what is missing', async () => {
  const answer = await app.visitor.get('/api/health')
  expect(answer.status).toBe(503)
  expect(answer.body).toEqual({ status: 'failing', database: 'ok', worker: 'away', schema: latest })
})

test('a person signed in for a test is who the server sees', async () => {
  const registrar = await app.signInAs('registrar')
  const answer = await registrar.get('/api/me')
  expect(answer.status).toBe(200)
  expect(answer.body).toMatchObject({ name: registrar.person.name })
})

test('an unknown route answers with a problem document', async () => {
  const answer = await app.visitor.get('/api/no-such-thing')
  expect(answer.status).toBe(404)
  expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/)
  expect(answer.body).toMatchObject({ status: 404 })
})
