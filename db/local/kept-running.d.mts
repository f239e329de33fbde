export interface KeepOptions {
  /** Where it runs; tsx is looked for from here. */
  root: string
  env: Record<string, string | undefined>
  output?: 'inherit' | 'ignore'
}

export function keepRunning(script: string, options: KeepOptions): { stop(): Promise<void> }
