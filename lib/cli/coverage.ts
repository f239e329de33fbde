import { printOutcome } from './print-outcome'
import { runCoverage } from './run-coverage'

await printOutcome((print) => runCoverage(process.argv.slice(2), print))
