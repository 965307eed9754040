const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const

const pending = new Set<() => void>()

/**
 * Registers an act that must be done even when the process is interrupted: removing a temporary file, ending a browser.
 * The act must be synchronous and must not throw. The returned function takes it off the list again without doing it.
 *
 * On SIGINT, SIGTERM or SIGHUP all registered acts are done and the signal is raised again, so that the process ends
 * with the status its parent expects. They are also done when the process exits by itself.
 */
export function cleanUpOnExit(act: () => void): () => void {
  if (pending.size === 0) listen()
  pending.add(act)
  return () => {
    pending.delete(act)
    if (pending.size === 0) stopListening()
  }
}

function listen(): void {
  for (const signal of SIGNALS) process.on(signal, interrupted)
  process.on('exit', cleanUp)
}

function stopListening(): void {
  for (const signal of SIGNALS) process.off(signal, interrupted)
  process.off('exit', cleanUp)
}

function interrupted(signal: NodeJS.Signals): void {
  cleanUp()
  process.kill(process.pid, signal)
}

function cleanUp(): void {
  stopListening()
  for (const act of pending) act()
  pending.clear()
}
