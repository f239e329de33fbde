import { parseArgs } from 'node:util'
import { CliFault } from './cli-fault'
import {
  countWithin,
  COVERAGE_CELLS,
  COVERAGE_QUANTITIES,
  HALF_WIDTH_68,
  HALF_WIDTH_95,
  measureCoverage,
  type CoverageCell,
  type CoverageDistances,
  type CoverageQuantity,
} from './measure-coverage'

const HELP = `Measures how often the intervals of 68 % and 95 % hold the truth, on simulated runs by fixed seeds.

npm run --silent coverage -- [--runs N]

  --runs N   runs of each cell, 1 to 100000; 1000 unless told
  --help     this text

Prints one JSON line for each cell, then the table of DEVELOPERS.md.
`

/** @throws {CliFault} naming the option and what it takes */
export function parseCoverageOptions(argv: string[]): { runs: number; isHelp: boolean } {
  let values: { runs?: string; help?: boolean }
  try {
    values = parseArgs({ args: argv, options: { runs: { type: 'string' }, help: { type: 'boolean' } } }).values
  } catch (error) {
    throw new CliFault(`${error instanceof Error ? error.message.split('\n')[0] : String(error)} (--help tells more)`)
  }
  const text = values.runs ?? '1000'
  const runs = /^\d{1,6}$/.test(text) ? Number(text) : 0
  if (runs < 1 || runs > 100_000) throw new CliFault(`--runs takes a whole number from 1 to 100000: got “${text}”`)
  return { runs, isHelp: values.help === true }
}

export function runCoverage(argv: string[], print: (text: string) => void): void {
  const { runs, isHelp } = parseCoverageOptions(argv)
  if (isHelp) return print(HELP)
  const measured = COVERAGE_CELLS.map((cell) => {
    const distances = measureCoverage(cell, runs)
    print(`${JSON.stringify(coverageLine(cell, distances, runs))}\n`)
    return { cell, distances }
  })
  print(`\n${coverageTable(measured, runs)}\n`)
}

export function coverageLine({ name, turns, isPromised }: CoverageCell, distances: CoverageDistances, runs: number) {
  const shares = (quantity: CoverageQuantity) => ({
    within68: countWithin(distances[quantity], HALF_WIDTH_68) / runs,
    within95: countWithin(distances[quantity], HALF_WIDTH_95) / runs,
  })
  return {
    noise: name,
    turns,
    runs,
    isPromised,
    period: shares('period'),
    amplitude: shares('amplitude'),
    drift: shares('drift'),
  }
}

/** One row for each kind of noise: shares in percent, 68 / 95, by turns. */
export function coverageTable(measured: { cell: CoverageCell; distances: CoverageDistances }[], runs: number): string {
  const percent = (distances: Float64Array, halfWidth: number) =>
    Math.round((100 * countWithin(distances, halfWidth)) / runs)
  const names = [...new Set(measured.map(({ cell }) => cell.name))]
  const rows = names.map((name) => {
    const ofName = measured.filter(({ cell }) => cell.name === name)
    const columns = COVERAGE_QUANTITIES.map((quantity) =>
      ofName
        .map(({ distances }) => {
          const own = distances[quantity]
          return `${percent(own, HALF_WIDTH_68)}/${percent(own, HALF_WIDTH_95)}`
        })
        .join(' · '),
    )
    const promise = ofName[0].cell.isPromised ? '' : ' (reported only)'
    return `| ${name}${promise} | ${columns.join(' | ')} |`
  })
  const turns = [...new Set(measured.map(({ cell }) => cell.turns))].join(' · ')
  return [
    `| noise, ${turns} turns | period | amplitude of order 1 | drift |`,
    '| --- | --- | --- | --- |',
    ...rows,
  ].join('\n')
}
