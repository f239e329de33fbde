import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { keepRunning } from '@/db/local/kept-running.mjs'
import { until } from '../support/local-mail'

vi.setConfig({ testTimeout: 60_000 })

let folder: string
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'turnwright-kept-'))
})
afterEach(() => rmSync(folder, { recursive: true, force: true }))

/** Notes its start, dies the first time, and notes that it was told to stop. */
const SCRIPT = `import { appendFileSync, readFileSync } from 'node:fs'
const note = (line) => appendFileSync(process.env.NOTES, line + '\\n')
note('started')
if (readFileSync(process.env.NOTES, 'utf8') === 'started\\n') process.exit(3)
process.on('SIGTERM', () => { note('told to stop'); process.exit(0) })
setInterval(() => {}, 1000)
note('runs')
`

test('what dies by itself is started again, what is told to stop is not', async () => {
  const said = vi.spyOn(console, 'error').mockImplementation(() => {})
  const [script, notes] = [join(folder, 'script.mjs'), join(folder, 'notes')]
  writeFileSync(script, SCRIPT)
  writeFileSync(notes, '')
  const read = async () => readFileSync(notes, 'utf8').trim().split('\n')
  const kept = keepRunning(script, { root: process.cwd(), env: { ...process.env, NOTES: notes }, output: 'ignore' })
  await until(read, (lines) => lines.includes('runs'))
  await kept.stop()
  expect(await read()).toEqual(['started', 'started', 'runs', 'told to stop'])
  expect(said.mock.calls).toEqual([[expect.stringMatching(/script\.mjs ended \(code 3\); it is started again/)]])
  said.mockClear()
})

test('told to stop while it waits for its next start, it does not start', async () => {
  const said = vi.spyOn(console, 'error').mockImplementation(() => {})
  const kept = keepRunning(join(folder, 'missing.mjs'), { root: process.cwd(), env: process.env, output: 'ignore' })
  await until(
    async () => said.mock.calls.length,
    (count) => count === 1,
  )
  await kept.stop()
  expect(said).toHaveBeenCalledTimes(1)
  said.mockClear()
})
