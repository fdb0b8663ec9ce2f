import { createServer } from 'node:net'

/** @param {string} host @param {number} port @returns {Promise<number | null>} the port that could be opened */
const open = (host, port) =>
  new Promise((resolve) => {
    const server = createServer()
    server.once('error', () => resolve(null))
    server.listen(port, host, () => {
      const { port: opened } = /** @type {import('node:net').AddressInfo} */ (server.address())
      server.close(() => resolve(opened))
    })
  })

/** @param {number} port */
export const isFree = async (port, host = '127.0.0.1') => (await open(host, port)) !== null

/** Any port that nobody uses now. */
export const anyFreePort = async (host = '127.0.0.1') => {
  const port = await open(host, 0)
  if (port === null) throw new Error(`no free port on ${host}`)
  return port
}

/** The first free port from `first` on. @param {number} first */
export const nextFreePort = async (first, host = '127.0.0.1') => {
  for (let port = first; port < first + 100; port++) if (await isFree(port, host)) return port
  return anyFreePort(host)
}
