/**
 * Keeps the last result of one stage of a computation: asked again with an equal key it answers at once, without a step.
 * Keys are compared as text (JSON of whatever the stage depends on).
 */
export function remember<Step, Value>(): (
  key: string,
  compute: () => Generator<Step, Value>,
) => Generator<Step, Value> {
  let kept: { key: string; value: Value } | null = null
  return function* (key, compute) {
    if (kept !== null && kept.key === key) return kept.value
    const value = yield* compute()
    kept = { key, value }
    return value
  }
}
