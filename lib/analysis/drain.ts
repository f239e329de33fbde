/** Runs a generator to its end and gives what it returns. */
export function drain<Result>(steps: Generator<unknown, Result>): Result {
  for (;;) {
    const step = steps.next()
    if (step.done) return step.value
  }
}
