import { printOutcome } from './print-outcome'
import { runAnalyse } from './run-analyse'

await printOutcome(async (print) => print(await runAnalyse(process.argv.slice(2))))
