export interface Counts {
  passed: number
  failed: number
  skipped: number
}

export class Tally implements Counts {
  passed: number
  failed: number
  skipped: number
  failures: string[]
  readonly summary: string
  add(counts: Partial<Counts>, name: string): void
}

export function vitestCounts(reportFile: string, code: number): Counts
export function playwrightCounts(reportFile: string, code: number): Counts
