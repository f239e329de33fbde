import { existsSync } from 'node:fs'
import { aptInstall } from './apt.mjs'
import { SetUpError } from './processes.mjs'

const PROGRAM = '/usr/bin/chromium'

/** Debian's own browser, which the browser tests drive; installed if we may. */
export async function ensureChromium() {
  if (!existsSync(PROGRAM)) await aptInstall(['chromium'], 'Chromium, which the browser tests drive,')
  if (!existsSync(PROGRAM)) throw new SetUpError(`Chromium was installed, but ${PROGRAM} is not there.`)
  return PROGRAM
}
