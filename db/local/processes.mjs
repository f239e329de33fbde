import { spawn, spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'

const children = new Set()

/** Ends every program that `run` still waits for. */
export function endChildren() {
  for (const child of children) child.kill('SIGTERM')
}

/** Runs a program to its end with its output on ours; answers the exit code (1 when it could not start). */
export function run(command, args, options = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, { stdio: 'inherit', ...options })
    children.add(child)
    child.on('error', (error) => {
      children.delete(child)
      console.error(`${command}: ${error.message}`)
      resolve(1)
    })
    child.on('exit', (code, signal) => {
      children.delete(child)
      resolve(code ?? (signal ? 1 : 0))
    })
  })
}

/** Runs a program to its end in silence; answers what it printed and whether it succeeded. */
export function capture(command, args, options = {}) {
  const result = spawnSync(command, args, { encoding: 'utf8', maxBuffer: 64 * 1024 * 1024, ...options })
  return {
    ok: !result.error && result.status === 0,
    stdout: result.stdout ?? '',
    stderr: result.error ? result.error.message : (result.stderr ?? ''),
  }
}

/** Whether a process with this id exists (also when it belongs to someone else). */
export function isAlive(pid) {
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return error.code === 'EPERM'
  }
}

/** The command line of a running process, or null where the system does not tell (/proc is Linux's). */
export function commandOf(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').join(' ')
  } catch {
    return null
  }
}

/**
 * Calls back once npm, through which we were started, is gone. A signal sent to npm alone reaches only the shell between
 * it and us, which dies without passing it on.
 */
export function whenNpmIsGone(callback) {
  if (!process.env.npm_lifecycle_event) return
  const parent = process.ppid
  const timer = setInterval(() => {
    if (process.ppid === parent) return
    clearInterval(timer)
    callback()
  }, 500)
  timer.unref()
}

export function isRoot() {
  return typeof process.getuid === 'function' && process.getuid() === 0
}

/** What the person at the terminal must do; told without a stack trace. */
export class SetUpError extends Error {}

export function pause(milliseconds) {
  return new Promise((resolve) => setTimeout(resolve, milliseconds))
}
