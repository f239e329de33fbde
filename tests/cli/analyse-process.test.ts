import { spawn } from 'node:child_process'
import { mkdtempSync, openSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, expect, test } from 'vitest'
import { runAnalyse } from '@/lib/cli/run-analyse'
import { recording } from './recordings'

const root = new URL('../..', import.meta.url).pathname
const folder = mkdtempSync(join(tmpdir(), 'turnwright-cli-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

const { text } = recording({ durationSeconds: 600 })
const path = join(folder, 'run.csv')
writeFileSync(path, text)

interface Ending {
  status: number | null
  out: string
  err: string
}

/** The command as people start it; `isReaderGone` closes the reading end of its output before anything is written. */
function run(argv: string[], { isReaderGone = false, output = 'pipe' as 'pipe' | number } = {}): Promise<Ending> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'lib/cli/analyse.ts', ...argv], {
      cwd: root,
      stdio: ['ignore', output, 'pipe'],
    })
    let [out, err] = ['', '']
    if (isReaderGone) child.stdout?.destroy()
    else child.stdout?.on('data', (part: Buffer) => (out += part.toString()))
    child.stderr?.on('data', (part: Buffer) => (err += part.toString()))
    child.on('error', reject)
    child.on('close', (status) => resolve({ status, out, err }))
  })
}

const STARTING = 60_000

test(
  'prints one line of JSON and nothing else, status 0',
  async () => {
    const options = ['--on', 'axis', '--teeth', '180', '--declination', '-12']
    const { status, out, err } = await run([path, ...options])
    expect({ status, err }).toEqual({ status: 0, err: '' })
    expect(out).toBe(await runAnalyse([path, ...options]))
    expect(out.trimEnd().split('\n')).toHaveLength(1)
  },
  STARTING,
)

test(
  '--help goes to the output, status 0',
  async () => {
    const { status, out, err } = await run(['--help'])
    expect({ status, err }).toEqual({ status: 0, err: '' })
    expect(out).toContain('npm run --silent analyse -- FILE')
  },
  STARTING,
)

test.each([
  ['an unknown option', [path, '--tooth', '5'], 'Unknown option'],
  ['a missing file', [join(folder, 'none.csv')], 'there is no such file'],
])(
  '%s: one line on the standard error, no stack, status 2',
  async (_, argv, told) => {
    const { status, out, err } = await run(argv)
    expect({ status, out }).toEqual({ status: 2, out: '' })
    expect(err).toContain(told)
    expect(err.trimEnd().split('\n')).toHaveLength(1)
    expect(err).not.toMatch(/\bat .*:\d+:\d+/)
  },
  STARTING,
)

test(
  'a reader that has gone is no fault',
  async () => {
    expect(await run([path, '--on', 'axis', '--pretty'], { isReaderGone: true })).toEqual({
      status: 0,
      out: '',
      err: '',
    })
  },
  STARTING,
)

test.skipIf(process.platform !== 'linux')(
  'a full disk is told in one line, status 2',
  async () => {
    const { status, err } = await run([path, '--on', 'axis'], { output: openSync('/dev/full', 'w') })
    expect(status).toBe(2)
    expect(err).toMatch(/^The output cannot be written: .*\n$/)
  },
  STARTING,
)
