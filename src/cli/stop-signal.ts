/** Aborts at the first SIGINT or SIGTERM; the second ends the process as usual. */
export function stopSignal(): { stop: AbortSignal; release: () => void } {
  const controller = new AbortController()
  const abort = () => {
    release()
    process.stderr.write('\nStopping after the work in hand; once more to stop at once.\n')
    controller.abort()
  }
  const release = () => {
    process.off('SIGINT', abort)
    process.off('SIGTERM', abort)
  }
  process.on('SIGINT', abort)
  process.on('SIGTERM', abort)
  return { stop: controller.signal, release }
}
