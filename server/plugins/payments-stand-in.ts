import { join } from 'node:path'
import type { IncomingMessage, ServerResponse } from 'node:http'
import { fromNodeMiddleware } from 'h3'
import { readConfig } from '../config'
import { PaymentsStandIn } from '../payments/standIn/handler'

/** In the demo, and there alone, the web serves the local stand-in of the payments service beside itself. */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  const config = readConfig(process.env)
  if (config.mode !== 'demo' || !config.stripe?.standIn) return
  const standIn = new PaymentsStandIn({
    folder: join(config.dataDir, 'payments'),
    secretKey: config.stripe.secretKey,
    webhookSecret: config.stripe.webhookSecret,
    webhookUrl: `${config.stripe.apiBase}/api/payments/webhook`,
    pageBase: `${config.publicUrl}/pay`,
  })
  const handler = fromNodeMiddleware(async (request: IncomingMessage & { originalUrl?: string }, response: ServerResponse) => {
    await standIn.handle(Object.assign(request, { url: request.originalUrl ?? request.url }) as never, response)
  })
  for (const path of ['/v1/**', '/pay', '/pay/**']) nitro.router.use(path, handler)
  nitro.hooks.hook('close', () => standIn.close())
})
