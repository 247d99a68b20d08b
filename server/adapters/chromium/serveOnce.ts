import { randomBytes } from 'node:crypto'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'

/** The printed document may use what it carries inside itself and nothing else. */
const policy = 'default-src \'none\'; style-src \'unsafe-inline\'; img-src data:; font-src data:; form-action \'none\'; base-uri \'none\'; sandbox'

export interface ServedDocument {
  url: string
  close: () => Promise<void>
}

/**
 * Offers a document on the loopback address under a random name, to be fetched once.
 * Handing a document of several megabytes over the debugging connection takes about three times as long.
 */
export async function serveOnce(html: string): Promise<ServedDocument> {
  const path = `/${randomBytes(24).toString('hex')}`
  let isServed = false
  const server = createServer((request, reply) => {
    if (request.method !== 'GET' || request.url !== path || isServed) {
      reply.writeHead(404).end()
      return
    }
    isServed = true
    reply.writeHead(200, { 'content-type': 'text/html; charset=utf-8', 'content-security-policy': policy, 'cache-control': 'no-store' })
    reply.end(html)
  })
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(0, '127.0.0.1', resolve)
  })
  const { port } = server.address() as AddressInfo
  return {
    url: `http://127.0.0.1:${port}${path}`,
    close: () => new Promise((resolve) => {
      server.closeAllConnections()
      server.close(() => resolve())
    }),
  }
}
