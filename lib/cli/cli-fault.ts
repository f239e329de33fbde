/** What the person at the command line can mend: one line, told without a stack trace. */
export class CliFault extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'CliFault'
  }
}
