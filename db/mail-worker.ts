import { mailSettings } from './mail/mail-settings'
import { runMailWorker } from './mail/run-mail-worker'
import { whenToldToStop } from './mail/when-told-to-stop'

/** `node --import tsx db/mail-worker.ts`: sends what stands in the queue until it is told to stop. */
async function main(): Promise<void> {
  const worker = await runMailWorker(mailSettings(process.env), (line) => console.log(`Mail: ${line}`))
  whenToldToStop(worker.stop)
  await worker.ended
}

try {
  await main()
} catch (error) {
  console.error(`The mail worker ended: ${error instanceof Error ? error.message : String(error)}`)
  process.exit(1)
}
