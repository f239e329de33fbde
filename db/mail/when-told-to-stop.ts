/** By a signal, or because the program that started us (and holds a channel to us) is gone. Stops once. */
export function whenToldToStop(stop: () => Promise<void>): void {
  let isStopping = false
  const once = async () => {
    if (isStopping) return
    isStopping = true
    await stop()
    // An open channel would keep us alive.
    if (process.connected) process.disconnect()
  }
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, once)
  process.on('disconnect', once)
}
