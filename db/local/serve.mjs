import { createServer } from 'node:http'
import next from 'next'
import { isReadableAddress } from './readable-address.mjs'

/*
 * Next.js behind a plain server of Node's, which tells the handlers from where a request really came: Next.js itself hands
 * on only headers, and those the asker can invent. lib/server/client-address.ts reads what is set here.
 *
 * `node db/local/serve.mjs [--dev]`, with PORT.
 */

const ADDRESS_HEADER = 'x-turnwright-address'

const isDevelopment = process.argv.includes('--dev')
const port = Number(process.env.PORT)
// Without this word, a request that names the header is a liar.
process.env.TURNWRIGHT_MARKS_ADDRESS = '1'

const server = createServer()
const app = next({ dev: isDevelopment, port, httpServer: server })
await app.prepare()
const handle = app.getRequestHandler()

server.on('request', (request, response) => {
  if (!isReadableAddress(request.url)) {
    response.writeHead(400, { 'content-type': 'text/plain; charset=utf-8', 'cache-control': 'no-store' })
    return response.end('This address can’t be read. Check it, or go back to the page that led here.\n')
  }
  request.headers[ADDRESS_HEADER] = request.socket.remoteAddress ?? ''
  handle(request, response).catch((error) => {
    console.error(error)
    if (!response.headersSent) response.writeHead(500)
    response.end()
  })
})
const sockets = new Set()
server.on('connection', (socket) => {
  sockets.add(socket)
  socket.on('close', () => sockets.delete(socket))
})
server.on('error', (error) => {
  console.error(error.message)
  process.exit(1)
})
server.listen(port)

let isStopping = false

/** Takes nothing new, lets what is being answered be answered, then ends. */
async function stop() {
  if (isStopping) return
  isStopping = true
  const closed = new Promise((resolve) => server.close(resolve))
  // Pages under development keep a connection open for as long as they are shown.
  if (isDevelopment) for (const socket of sockets) socket.destroy()
  await closed
  await app.close()
  process.exit(0)
}

for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => void stop())
