/**
 * Once armed, aborts at the first SIGINT or SIGTERM; before, and at the second, a signal ends the process as usual, whatever
 * the main thread is doing.
 */
export function stopSignal(): { stop: AbortSignal; arm: () => void; release: () => void } {
  const controller = new AbortController()
  const abort = () => {
    release()
    process.stderr.write('\nStopping after the work in hand; once more to stop at once.\n')
    controller.abort()
  }
  const arm = () => {
    process.on('SIGINT', abort)
    process.on('SIGTERM', abort)
  }
  const release = () => {
    process.off('SIGINT', abort)
    process.off('SIGTERM', abort)
  }
  return { stop: controller.signal, arm, release }
}
