/**
 * Runs a command and writes what it prints to the standard output. Whatever goes wrong is one line on the standard error and exit
 * status 2, never a stack; a reader that has read enough (`… | head -1`) is no fault.
 */
export async function printOutcome(command: (print: (text: string) => void) => Promise<void> | void): Promise<void> {
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') tellFault(new Error(`The output cannot be written: ${error.message}`))
  })
  // Nobody is left to be told.
  process.stderr.on('error', () => undefined)
  try {
    await command((text) => void process.stdout.write(text))
  } catch (error) {
    tellFault(error)
  }
}

function tellFault(error: unknown): void {
  const message = error instanceof Error ? error.message : String(error)
  process.exitCode = 2
  process.stderr.write(`${message.replace(/\s*\n\s*/g, ' ')}\n`)
}
