import { createServer } from 'node:net'

/**
 * @param {number} port 0 asks the system for any
 * @param {string} host
 * @returns {Promise<number | null>} the port where it is free, null where it is taken
 */
export function tryPort(port, host) {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', (/** @type {NodeJS.ErrnoException} */ error) => {
      if (error.code === 'EADDRINUSE' || error.code === 'EACCES') resolve(null)
      else reject(error)
    })
    probe.listen(port, host, () => {
      const address = probe.address()
      const found = typeof address === 'object' && address ? address.port : port
      probe.close(() => resolve(found))
    })
  })
}

/**
 * The first free port of up to 50 from the one wished for.
 * @param {number} wished
 * @param {string} host
 */
export async function findPort(wished, host) {
  for (let port = wished; port < wished + 50; port++) if (await tryPort(port, host) !== null) return port
  throw new Error(`No port from ${wished} to ${wished + 49} is free on ${host}.`)
}
