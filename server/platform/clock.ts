/** The only source of the present time on the server. Every date that is recorded comes from here. */
export interface Clock {
  now(): Date
}

export const systemClock: Clock = { now: () => new Date() }

/** A clock that stands still until it is moved: for the demo seed and for tests. */
export interface SettableClock extends Clock {
  set(time: Date): void
  advance(milliseconds: number): void
}

export function settableClock(start: Date): SettableClock {
  let time = start.getTime()
  return {
    now: () => new Date(time),
    set: (to) => {
      time = to.getTime()
    },
    advance: (milliseconds) => {
      time += milliseconds
    },
  }
}
