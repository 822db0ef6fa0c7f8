import { createHash } from 'node:crypto'
import { createServer } from 'node:net'
import { Refusal } from './refusal.mjs'

/**
 * True when a server could listen on this port of 127.0.0.1 now.
 * @param {number} port
 * @returns {Promise<boolean>}
 */
export function isPortFree(port) {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', () => resolve(false))
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => server.close(() => resolve(true)))
  })
}

/**
 * A free port below the range that outgoing connections borrow from (32768), the same one each time if it can be.
 * @param {string} seed
 * @returns {Promise<number>}
 */
export async function findFreePort(seed) {
  const first = createHash('sha256').update(seed).digest().readUInt16BE() % 10_000
  for (let tried = 0; tried < 200; tried += 1) {
    const port = 20_000 + ((first + tried * 7) % 10_000)
    if (await isPortFree(port)) return port
  }
  throw new Refusal('Found no free port between 20000 and 30000 on 127.0.0.1.')
}
