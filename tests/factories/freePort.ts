import { createServer } from 'node:net'

/** A port of this machine that nothing listens on. */
export const freePort = () => new Promise<number>((resolve, reject) => {
  const probe = createServer()
  probe.on('error', reject)
  probe.listen(0, '127.0.0.1', () => {
    const address = probe.address()
    probe.close(() => typeof address === 'object' && address !== null ? resolve(address.port) : reject(new Error('No free port.')))
  })
})
