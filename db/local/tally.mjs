import { readFileSync } from 'node:fs'

/** Counts what passed and what failed over all steps. */
export class Tally {
  passed = 0
  failed = 0
  skipped = 0
  failures = []

  add({ passed = 0, failed = 0, skipped = 0 }, name) {
    this.passed += passed
    this.failed += failed
    this.skipped += skipped
    if (failed > 0) this.failures.push(`${name}: ${failed} failed`)
  }

  /** The last line of all; nothing follows it. */
  get summary() {
    return `${this.passed} passed, ${this.failed} failed`
  }
}

function readReport(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return null
  }
}

/**
 * A run that ended badly must never count as good: where the exit code tells of a failure that the report does not (a
 * file that could not be loaded, a crash), it counts as one; so does a report without a single test.
 */
function withExitCode(counts, code) {
  const isSilent = counts.failed === 0 && (code !== 0 || counts.passed === 0)
  return isSilent ? { ...counts, failed: 1 } : counts
}

export function vitestCounts(reportFile, code) {
  const { numPassedTests = 0, numFailedTests = 0, numPendingTests = 0, numTodoTests = 0 } = readReport(reportFile) ?? {}
  return withExitCode({ passed: numPassedTests, failed: numFailedTests, skipped: numPendingTests + numTodoTests }, code)
}

export function playwrightCounts(reportFile, code) {
  const { expected = 0, unexpected = 0, flaky = 0, skipped = 0 } = readReport(reportFile)?.stats ?? {}
  return withExitCode({ passed: expected, failed: unexpected + flaky, skipped }, code)
}
