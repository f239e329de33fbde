import { existsSync, readFileSync, rmSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { checkDatabase } from './local/check-database.mjs'
import { checkNodeVersion, ensureDependencies } from './local/dependencies.mjs'
import { startLocalMail, startMailWorker } from './local/mail.mjs'
import { openOwnCluster } from './local/own-cluster.mjs'
import { freePortFrom, isPortFree } from './local/ports.mjs'
import { endChildren, run, SetUpError, whenNpmIsGone } from './local/processes.mjs'
import { linkOriginOf, readSettings } from './local/settings.mjs'
import { ensureBuild } from './local/sources.mjs'
import { startWebServer } from './local/web-server.mjs'

/*
 * `npm start`, and `npm run dev` with --dev. Everything that a fresh clone lacks is fetched, made or built here, so this
 * file and what it imports use nothing but Node.js.
 */

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const isDevelopment = process.argv.includes('--dev')
const signInsFile = join(root, '.data', 'demo-sign-ins.json')

/** What was started, in order; ended in the opposite one. */
const started = []
let isStopping = false

async function stopAll() {
  if (isStopping) return
  isStopping = true
  endChildren()
  for (const stop of started.reverse()) await stop()
}

async function runScript(script, env) {
  const code = await run(process.execPath, ['--import', 'tsx', script], { cwd: root, env })
  if (code !== 0) throw new SetUpError(`${script} failed; it says why above.`)
}

async function choosePort(wanted) {
  if (!wanted) return freePortFrom(3000)
  if (await isPortFree(Number(wanted))) return Number(wanted)
  throw new SetUpError(`Port ${wanted} is taken by another program. Set PORT to a free one, or leave it out.`)
}

/** Our own cluster, with the demo in it, unless DATABASE_URL names another database. */
async function openDatabase(settings) {
  if (settings.DATABASE_URL) {
    await checkDatabase(settings.DATABASE_URL)
    return { url: settings.DATABASE_URL, isOwn: false }
  }
  const cluster = await openOwnCluster(root)
  started.push(cluster.close)
  if (cluster.isNew) rmSync(signInsFile, { force: true })
  return { url: cluster.url, isOwn: true }
}

/** Mail goes to SMTP_URL; without one to a server of our own, whose messages are read on a page. */
async function openMail(settings, env, port) {
  const linkOrigin = linkOriginOf(settings, port)
  if (settings.SMTP_URL && !settings.BASE_URL) {
    console.warn(
      `\nSMTP_URL is set and BASE_URL is not: the links in mails lead to ${linkOrigin}, which only this machine can open.`,
    )
  }
  const common = { ...env, LINK_ORIGIN: linkOrigin }
  if (settings.SMTP_URL) return common
  const local = await startLocalMail({ root, env: common, folder: join(root, '.data', 'mail') })
  started.push(local.stop)
  return { ...common, ...local.env }
}

function printSignIns() {
  console.log('\nSign-ins of the demo (kept in .data/demo-sign-ins.json):')
  for (const { email, password, role } of JSON.parse(readFileSync(signInsFile, 'utf8'))) {
    console.log(`  ${role.padEnd(7)} ${email.padEnd(34)} ${password}`)
  }
}

async function main() {
  checkNodeVersion()
  const settings = readSettings(root)
  // Asked again below, but a port that is taken should not be told after minutes of building.
  await choosePort(settings.PORT)
  await ensureDependencies(root)
  const database = await openDatabase(settings)
  if (isStopping) return
  const env = { ...process.env, ...settings, DATABASE_URL: database.url, NEXT_TELEMETRY_DISABLED: '1' }
  // The page with the local mails exists only while we run their server ourselves.
  delete env.LOCAL_MAIL_FOLDER
  for (const name of Object.keys(env)) if (env[name] === undefined) delete env[name]
  await runScript('db/migrate.ts', env)
  if (database.isOwn && !existsSync(signInsFile)) {
    await runScript('db/seed.ts', { ...env, SIGN_INS_FILE: signInsFile })
  }
  if (!isDevelopment) await ensureBuild(root, env)
  if (isStopping) return
  const port = await choosePort(settings.PORT)
  const mailEnv = await openMail(settings, env, port)
  started.push(startMailWorker({ root, env: mailEnv }).stop)
  const server = await startWebServer({ root, port, env: { ...mailEnv, PORT: String(port) }, isDevelopment })
  started.push(server.stop)
  await server.whenReady()
  const address = linkOriginOf(settings, port)
  console.log(`\nTurnwright is at ${address}   (Ctrl-C stops it)`)
  if (!settings.SMTP_URL) console.log(`Its mails stay on this machine; read them at ${address}/local-mail`)
  if (database.isOwn) printSignIns()
  const code = await server.ended
  if (!isStopping) process.exitCode = code || 1
}

/** A checkout that was started by another user (root, say) before holds files that are not ours. */
function noRight({ code, path }) {
  if (!['EACCES', 'EPERM'].includes(code) || !path) return null
  return `\nThis user may not write ${path}: start as the one who started first, or make the checkout's files yours (chown).`
}

function stopNow() {
  if (isStopping) return
  console.log('\nStopping …')
  void stopAll().then(() => process.exit(0))
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, stopNow)
whenNpmIsGone(stopNow)
// The terminal that showed our output may be gone before us.
for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {})

try {
  await main()
} catch (error) {
  if (!isStopping) {
    console.error(error instanceof SetUpError ? `\n${error.message}` : (noRight(error) ?? error))
    process.exitCode = 1
  }
}
await stopAll()
