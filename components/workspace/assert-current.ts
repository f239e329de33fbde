import type { BenchAnalysis } from '@/lib/client/use-analysis'

/** Figures go out only with the settings that they were computed from. @throws {Error} with a message to show */
export function assertCurrent({ isCurrent, isComputing }: Pick<BenchAnalysis, 'isCurrent' | 'isComputing'>): void {
  if (isCurrent) return
  throw new Error(
    isComputing
      ? 'The figures are still being computed. Try again in a moment.'
      : 'Computing was stopped, so the figures on screen belong to earlier settings. Undo the change, or make another, and try again.',
  )
}
