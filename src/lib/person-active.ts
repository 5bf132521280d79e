const activeForMs = 60_000
let lastInput = Number.NEGATIVE_INFINITY

/** Notes real input, so that only a person keeps a session alive and never a poll (rulings.md 19). */
export function watchForInput(): void {
  const note = () => {
    lastInput = Date.now()
  }
  for (const kind of ['pointerdown', 'keydown', 'wheel', 'touchstart'] as const) {
    window.addEventListener(kind, note, { capture: true, passive: true })
  }
}

/** The header that says a person is at work, when one was within the last minute. */
export function personActive(): Record<string, string> {
  return Date.now() - lastInput < activeForMs ? { 'X-Person-Active': '1' } : {}
}
