import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { run, SetUpError } from './processes.mjs'

/** What the production build is made of. */
const FOLDERS = ['app', 'components', 'db', 'lib', 'public', 'workers']
const FILES = [
  'proxy.ts',
  'next.config.mjs',
  'postcss.config.mjs',
  'tailwind.config.ts',
  'tsconfig.json',
  'package.json',
  'package-lock.json',
]

function filesBelow(root, folder) {
  const path = join(root, folder)
  if (!existsSync(path)) return []
  return readdirSync(path, { withFileTypes: true }).flatMap((entry) => {
    const name = `${folder}/${entry.name}`
    return entry.isDirectory() ? filesBelow(root, name) : [name]
  })
}

function hashOfSources(root) {
  const hash = createHash('sha256')
  const names = [...FOLDERS.flatMap((folder) => filesBelow(root, folder)), ...FILES].sort()
  for (const name of names) {
    const path = join(root, name)
    if (existsSync(path)) hash.update(`${name}\0`).update(readFileSync(path)).update('\0')
  }
  return hash.digest('hex')
}

export function nextProgram(root) {
  return join(root, 'node_modules', 'next', 'dist', 'bin', 'next')
}

/** Builds unless the last build was made of the very same sources (or in any case, when forced). */
export async function ensureBuild(root, env, { isForced = false } = {}) {
  const note = join(root, '.next', 'turnwright-sources')
  const hash = hashOfSources(root)
  const isBuilt = existsSync(join(root, '.next', 'BUILD_ID')) && existsSync(note) && readFileSync(note, 'utf8') === hash
  if (isBuilt && !isForced) return
  console.log('Building …')
  // A build that is broken off must not pass for the one before it.
  rmSync(note, { force: true })
  const code = await run(process.execPath, [nextProgram(root), 'build'], { cwd: root, env })
  if (code !== 0) throw new SetUpError('The build failed; Next.js says why above.')
  writeFileSync(note, hash)
}
