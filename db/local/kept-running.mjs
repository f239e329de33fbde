import { spawn } from 'node:child_process'

/** A program that dies at once is not started over and over in a tight loop. */
const FIRST_WAIT = 1000
const LONGEST_WAIT = 30_000
const RAN_WELL = 60_000

/** Runs a script of ours beside the web server and starts it again whenever it ends by itself, until `stop()`. */
export function keepRunning(script, { root, env, output = 'inherit' }) {
  let child = null
  let isStopping = false
  let wait = FIRST_WAIT
  let wake = () => {}

  async function once() {
    const began = Date.now()
    // Detached: Ctrl-C in the terminal must not end it before we know that it is to end. The channel tells it when we
    // are gone ourselves.
    const stdio = ['ignore', output, output, 'ipc']
    child = spawn(process.execPath, ['--import', 'tsx', script], { cwd: root, env, stdio, detached: true })
    const how = await new Promise((resolve) => {
      child.on('error', (error) => resolve(error.message))
      child.on('exit', (code, signal) => resolve(signal ?? `code ${code}`))
    })
    child = null
    if (isStopping) return
    wait = Date.now() - began > RAN_WELL ? FIRST_WAIT : Math.min(2 * wait, LONGEST_WAIT)
    console.error(`${script} ended (${how}); it is started again in ${wait / 1000} s.`)
    await new Promise((resolve) => {
      const timer = setTimeout(resolve, wait)
      wake = () => resolve(clearTimeout(timer))
    })
  }

  const ended = (async () => {
    while (!isStopping) await once()
  })()

  return {
    async stop() {
      isStopping = true
      wake()
      const running = child
      running?.kill('SIGTERM')
      const timer = setTimeout(() => running?.kill('SIGKILL'), 10_000)
      await ended
      clearTimeout(timer)
    },
  }
}
