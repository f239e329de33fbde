import { createHash } from 'node:crypto'
import { existsSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { run, SetUpError } from './processes.mjs'

const NEEDED_NODE = 20

export function checkNodeVersion() {
  if (Number(process.versions.node.split('.')[0]) >= NEEDED_NODE) return
  throw new SetUpError(`Turnwright needs Node.js ${NEEDED_NODE} or newer; this is ${process.versions.node}.`)
}

/**
 * Whether node_modules is what package-lock.json asks for: by the hash noted at our last install, or, where someone
 * else installed, by npm's own list being newer than the lock.
 */
function areDependenciesInstalled(root, lockHash) {
  const modules = join(root, 'node_modules')
  const list = join(modules, '.package-lock.json')
  if (!existsSync(list)) return false
  const note = join(modules, '.turnwright-lock')
  if (existsSync(note) && readFileSync(note, 'utf8') === lockHash) return true
  return statSync(list).mtimeMs >= statSync(join(root, 'package-lock.json')).mtimeMs
}

/** Installs exactly what the lock says when it is not there yet. */
export async function ensureDependencies(root) {
  const lockHash = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex')
  if (areDependenciesInstalled(root, lockHash)) return
  console.log('Installing the locked dependencies (npm ci) …')
  // Development dependencies are needed to build and to run scripts, whatever NODE_ENV says.
  const code = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { cwd: root })
  if (code !== 0) throw new SetUpError('The dependencies could not be installed; npm says why above.')
  writeFileSync(join(root, 'node_modules', '.turnwright-lock'), lockHash)
}
