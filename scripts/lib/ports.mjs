import net from 'node:net'

/**
 * A TCP port nobody listens on at this moment. Another process may take it before it is used,
 * so whoever starts a server on it tries again with another one.
 *
 * @param {string} [host]
 * @returns {Promise<number>}
 */
export function freePort(host = '127.0.0.1') {
  return new Promise((resolve, reject) => {
    const server = net.createServer()
    server.once('error', reject)
    server.listen({ port: 0, host, exclusive: true }, () => {
      const { port } = /** @type {net.AddressInfo} */ (server.address())
      server.close(() => resolve(port))
    })
  })
}

/**
 * Whether a server could listen there.
 *
 * @param {number} port
 * @param {string} host
 * @returns {Promise<null | string>} null, or the error code that listening gave (EADDRINUSE, EACCES, EADDRNOTAVAIL, …)
 */
export function whyNotListen(port, host) {
  return new Promise((resolve) => {
    const server = net.createServer()
    server.once('error', (error) => resolve(/** @type {NodeJS.ErrnoException} */ (error).code ?? 'EUNKNOWN'))
    server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(null)))
  })
}
