import { printOutcome } from './print-outcome'
import { runAnalyse } from './run-analyse'

await printOutcome(() => runAnalyse(process.argv.slice(2)))
