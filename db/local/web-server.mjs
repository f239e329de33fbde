import { spawn } from 'node:child_process'
import { join } from 'node:path'
import { pause, SetUpError } from './processes.mjs'

/** Starts Next.js and waits until it and the database behind it answer. */
export async function startWebServer({ root, port, env, isDevelopment = false, stdio = 'inherit' }) {
  const args = [join(root, 'db', 'local', 'serve.mjs'), ...(isDevelopment ? ['--dev'] : [])]
  const serverEnv = { ...env, PORT: String(port), NODE_ENV: isDevelopment ? 'development' : 'production' }
  // Not through a shell: the process that we end must be the server itself.
  const child = spawn(process.execPath, args, { cwd: root, env: serverEnv, stdio })
  const ended = new Promise((resolve) => {
    child.on('error', () => resolve(1))
    child.on('exit', (code, signal) => resolve(code ?? (signal ? 0 : 1)))
  })
  let isEnded = false
  void ended.then(() => (isEnded = true))
  const stop = async () => {
    if (isEnded) return
    child.kill('SIGTERM')
    await Promise.race([ended, pause(10_000)])
    if (!isEnded) child.kill('SIGKILL')
    await ended
  }
  return { ended, stop, whenReady: () => whenReady(port, () => isEnded) }
}

async function whenReady(port, isEnded) {
  for (let waited = 0; waited < 120_000; waited += 200) {
    if (isEnded()) throw new SetUpError('The web server ended before it answered; it says why above.')
    try {
      const response = await fetch(`http://127.0.0.1:${port}/api/health`)
      if (response.ok) return
    } catch {
      // Not listening yet.
    }
    await pause(200)
  }
  throw new SetUpError('The web server did not answer within two minutes.')
}
