/** Version of the signing policy under which enrolments and signatures are made; named in each of them. */
export const policyVersion = '1'

/** How long a prepared document may be signed. */
export const documentMinutes = 15

/** Wrong proofs that lock a key, and for how long. */
export const allowedFailures = 5
export const lockMinutes = 15

/** Upper bounds of the derivation: what a browser can still do. The lower ones are in the contract. */
export const largestKdf = { n: 2 ** 20, r: 16, p: 4 }

export const minutesAfter = (time: Date, minutes: number): Date => new Date(time.getTime() + minutes * 60_000)
