import { randomUUID } from 'node:crypto'

export default defineEventHandler((event) => {
  event.context.requestId = randomUUID()
  setResponseHeader(event, 'x-request-id', event.context.requestId)
})
