import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { ensureChromium } from './local/chromium.mjs'
import { createDatabaseIfMissing } from './local/create-database.mjs'
import { checkNodeVersion, ensureDependencies } from './local/dependencies.mjs'
import { startLocalMail, startMailWorker } from './local/mail.mjs'
import { freePort } from './local/ports.mjs'
import { endChildren, run, SetUpError, whenNpmIsGone } from './local/processes.mjs'
import { ensureBuild, nextProgram } from './local/sources.mjs'
import { playwrightCounts, Tally, vitestCounts } from './local/tally.mjs'
import { startThrowawayCluster } from './local/throwaway-cluster.mjs'
import { startWebServer } from './local/web-server.mjs'

/*
 * `npm test`: installs what is missing, then every check there is, from types to browsers. Each check of the sources
 * counts as one; tests count one by one. A failure does not stop the steps that do not need what failed.
 */

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const scratch = mkdtempSync(join(tmpdir(), 'turnwright-report-'))
const tally = new Tally()
/** What was started, in order; ended in the opposite one. */
const started = []
let isStopping = false

/** Settings of whoever runs the tests must not reach them; empty also keeps Next.js from reading .env. */
const env = {
  ...process.env,
  DATABASE_URL: '',
  SMTP_URL: '',
  MAIL_FROM: '',
  LOCAL_MAIL_FOLDER: '',
  BASE_URL: '',
  TRUST_PROXY: '',
  NEXT_TELEMETRY_DISABLED: '1',
}

async function stopAll() {
  if (isStopping) return
  isStopping = true
  endChildren()
  for (const stop of started.reverse()) await stop()
  rmSync(scratch, { recursive: true, force: true })
}

function node(args, more = {}) {
  return run(process.execPath, args, { cwd: root, env: { ...env, ...more } })
}

const tool = (...path) => join(root, 'node_modules', ...path)

async function step(name, work) {
  if (isStopping) return
  const began = Date.now()
  console.log(`\n=== ${name}`)
  let counts
  try {
    counts = await work()
  } catch (error) {
    console.error(error instanceof SetUpError ? error.message : error)
    counts = { failed: 1 }
  }
  if (isStopping) return
  tally.add(counts, name)
  console.log(`=== ${name}: ${counts.failed ? 'FAILED' : 'passed'} after ${Math.round((Date.now() - began) / 1000)} s`)
}

/** A check that either passes or fails as a whole. */
const one = (code) => (code === 0 ? { passed: 1 } : { failed: 1 })

async function checkTypes() {
  // A fresh clone has no generated route types yet, and tsc needs them.
  const typegen = await node([nextProgram(root), 'typegen'])
  return one(typegen || (await node([tool('typescript', 'bin', 'tsc'), '--noEmit'])))
}

async function runVitest(clusterUrl) {
  const report = join(scratch, 'vitest.json')
  const args = [tool('vitest', 'vitest.mjs'), 'run', '--reporter=default', '--reporter=json', `--outputFile=${report}`]
  // Vitest sets NODE_ENV itself; a value from outside would change what React does.
  const code = await node(args, { TEST_DATABASE_URL: clusterUrl, NODE_ENV: 'test' })
  return vitestCounts(report, code)
}

async function runPlaywright(clusterUrl) {
  const url = new URL(clusterUrl)
  url.pathname = '/turnwright_e2e'
  await createDatabaseIfMissing(clusterUrl, 'turnwright_e2e')
  const signInsFile = join(scratch, 'sign-ins.json')
  const database = { DATABASE_URL: url.href, SIGN_INS_FILE: signInsFile }
  for (const script of ['db/migrate.ts', 'db/seed.ts']) {
    if ((await node(['--import', 'tsx', script], database)) !== 0) throw new SetUpError(`${script} failed`)
  }
  const port = await freePort()
  const serverEnv = { ...env, DATABASE_URL: url.href, LINK_ORIGIN: `http://localhost:${port}` }
  const mail = await startLocalMail({ root, env: serverEnv, folder: join(scratch, 'mail') })
  started.push(mail.stop)
  const mailEnv = { ...serverEnv, ...mail.env }
  const worker = startMailWorker({ root, env: mailEnv })
  started.push(worker.stop)
  const server = await startWebServer({ root, port, env: mailEnv })
  started.push(server.stop)
  await server.whenReady()
  const report = join(scratch, 'playwright.json')
  const code = await node([tool('@playwright', 'test', 'cli.js'), 'test'], {
    E2E_BASE_URL: `http://localhost:${port}`,
    E2E_REPORT: report,
    E2E_DATABASE_URL: url.href,
    SIGN_INS_FILE: signInsFile,
  })
  for (const each of [server, worker, mail]) await each.stop()
  return playwrightCounts(report, code)
}

async function main() {
  checkNodeVersion()
  await ensureDependencies(root)
  await ensureChromium()
  await step('Types', checkTypes)
  await step('Lint', async () => one(await node([tool('eslint', 'bin', 'eslint.js'), '.'])))
  await step('Format', async () => one(await node([tool('prettier', 'bin', 'prettier.cjs'), '--check', '.'])))
  const cluster = await startThrowawayCluster()
  started.push(cluster.remove)
  await step('Unit, component and database tests', () => runVitest(cluster.url))
  let isBuilt = false
  await step('Production build', async () => {
    await ensureBuild(root, env, { isForced: true })
    isBuilt = true
    return { passed: 1 }
  })
  await step('Browser tests', () => {
    if (!isBuilt) throw new SetUpError('There is no build to test')
    return runPlaywright(cluster.url)
  })
}

const stopNow = () => void stopAll().then(() => process.exit(130))
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, stopNow)
whenNpmIsGone(stopNow)

try {
  await main()
} catch (error) {
  console.error(error instanceof SetUpError ? `\n${error.message}` : error)
  tally.add({ failed: 1 }, 'Set-up')
}
const wasStopped = isStopping
await stopAll()
if (!wasStopped) {
  for (const failure of tally.failures) console.log(failure)
  if (tally.skipped > 0) console.log(`${tally.skipped} skipped`)
  console.log(tally.summary)
  process.exitCode = tally.failed > 0 ? 1 : 0
}
