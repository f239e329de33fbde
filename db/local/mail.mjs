import { connect } from 'node:net'
import { keepRunning } from './kept-running.mjs'
import { freePort } from './ports.mjs'
import { pause, SetUpError } from './processes.mjs'

function answersOn(port) {
  return new Promise((resolve) => {
    const socket = connect({ port, host: '127.0.0.1' })
    socket.once('connect', () => resolve(true) || socket.destroy())
    socket.once('error', () => resolve(false))
  })
}

/**
 * The mail server that everything goes to while no other is named: it keeps each message as a file and sends none on.
 *
 * @returns what the web server and the mail worker must know of it
 */
export async function startLocalMail({ root, env, folder }) {
  const port = await freePort()
  const server = keepRunning('db/local-mail.ts', {
    root,
    env: { ...env, LOCAL_MAIL_FOLDER: folder, LOCAL_MAIL_PORT: String(port) },
  })
  for (let waited = 0; !(await answersOn(port)); waited += 100) {
    if (waited >= 60_000) {
      await server.stop()
      throw new SetUpError('The local mail server did not answer within a minute.')
    }
    await pause(100)
  }
  return { env: { SMTP_URL: `smtp://127.0.0.1:${port}`, LOCAL_MAIL_FOLDER: folder }, stop: server.stop }
}

/** Sends what stands in the queue; started again if it breaks, since nobody may lose a mail by that. */
export function startMailWorker({ root, env }) {
  return keepRunning('db/mail-worker.ts', { root, env })
}
