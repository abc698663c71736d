// @ts-check
import { createServer } from 'node:net'

/**
 * @returns {Promise<number>} a TCP port of 127.0.0.1 that nobody listens on at this moment
 */
export function freePort() {
  return new Promise((resolve, reject) => {
    const server = createServer()
    server.once('error', reject)
    server.listen(0, '127.0.0.1', () => {
      const { port } = /** @type {import('node:net').AddressInfo} */ (server.address())
      server.close(() => resolve(port))
    })
  })
}
