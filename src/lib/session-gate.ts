/**
 * A session that ended while work is on the screen. Calls that meet a 401 wait here; the page stays as it is, a dialog
 * offers to sign in again in a window of its own, and when that is done they are tried once more.
 */
const channelName = 'halfsilver-session'

type Listener = () => void
const listeners = new Set<Listener>()
let waiting: { done: Promise<void>; finish: () => void } | null = null

let known = false

/** Notes that somebody is signed in: from now on a 401 means that the session ended under the person's hands. */
export function noteSession(): void {
  known = true
}

/** Whether a session was there and may have ended; before the first there is nothing on the screen to keep. */
export function hadSession(): boolean {
  return known
}

function tell(): void {
  for (const listener of listeners) listener()
}

/** Resolves when somebody has signed in again. */
export function untilSignedIn(): Promise<void> {
  if (!waiting) {
    let finish = () => {}
    const done = new Promise<void>((resolve) => {
      finish = resolve
    })
    waiting = { done, finish }
    tell()
  }
  return waiting.done
}

/** Lets the calls that wait go on. */
export function letWaitingGo(): void {
  waiting?.finish()
  waiting = null
  tell()
}

/** Whether calls wait for a sign-in; for useSyncExternalStore. */
export function isWaitingForSignIn(): boolean {
  return waiting !== null
}

export function subscribeToGate(listener: Listener): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** Runs `then` whenever a sign-in window reports that it is done. */
export function onSignedInElsewhere(then: () => void): () => void {
  const channel = new BroadcastChannel(channelName)
  channel.onmessage = () => then()
  return () => channel.close()
}

/** Opens the sign-in page in a window of its own, which ends at `/signed-in`. False when the browser refused. */
export function openSignInWindow(): boolean {
  return window.open('/sign-in?returnTo=%2Fsigned-in', '_blank', 'popup,width=600,height=800') !== null
}

/** In the sign-in window, back from the code host: tells the others and closes. */
export function reportSignedIn(): void {
  const channel = new BroadcastChannel(channelName)
  channel.postMessage('signed-in')
  channel.close()
  window.close()
}
