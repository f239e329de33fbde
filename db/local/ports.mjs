import { createServer } from 'node:net'

/** Whether nothing listens on this port of this machine (all addresses, as the web server will ask for). */
export function isPortFree(port, host) {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', () => resolve(false))
    server.listen({ port, host, exclusive: true }, () => server.close(() => resolve(true)))
  })
}

/** A port of 127.0.0.1 that is free at this moment, chosen by the system. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const server = createServer()
    server.once('error', reject)
    server.listen({ port: 0, host: '127.0.0.1' }, () => {
      const { port } = server.address()
      server.close(() => resolve(port))
    })
  })
}

/** The first free port from the wanted one upwards. */
export async function freePortFrom(wanted, attempts = 50) {
  for (let port = wanted; port < wanted + attempts; port += 1) if (await isPortFree(port)) return port
  return freePort()
}
