import type { Meaning } from './event-payloads.ts'

/** What a signer is told about the entry; the sentence names it, so that it cannot stand for another one. */
export interface SignedEntry {
  laboratory: string
  number: string
  revision: number
  title: string
}

const named = (entry: SignedEntry) =>
  `revision ${entry.revision} of entry ${entry.number}, “${entry.title}”, of ${entry.laboratory}`

/**
 * The sentence that a signer reads, signs and that is printed with the signature. `presence` is needed for witness-present:
 * the run's number and the times, as signed.
 */
export function signingStatement(
  meaning: Meaning,
  entry: SignedEntry,
  presence?: { run: string; from: string; to: string },
): string {
  switch (meaning) {
    case 'authorship':
      return `I wrote ${named(entry)}, alone or with the other authors named. It tells what I did and saw; its files, readings and calculations are those listed here. By my signature I take responsibility for it.`
    case 'witness-read':
      return `I have read ${named(entry)}, and understood it. I am not among its authors and contributed nothing to it. My signature says that the entry existed in this form when I signed; it does not say that its statements are true.`
    case 'witness-present':
      if (!presence) throw new Error('A witness who was present names the run and the times.')
      return `I was present at run ${presence.run} from ${presence.from} to ${presence.to} and saw the measurement that ${named(entry)} tells of. I have read that entry and understood it. I am not among its authors and contributed nothing to it.`
  }
}

/** The sentence that a new key signs about itself. */
export function enrolmentStatement(person: { name: string; laboratory: string }): string {
  return `I, ${person.name}, made this signing key on a device that I trust and alone know the passphrase that opens it. At ${person.laboratory} a signature by this key stands for my signature by hand. If the passphrase or the key may have become known to somebody else, I shall say so at once.`
}

/** The sentence that a manager or supervisor signs about the key of another person. */
export function endorsementStatement(parts: {
  endorser: string
  person: string
  laboratory: string
  /** First 16 hex digits of the enrolment's SHA-256, as both people compared them. */
  keyDigits: string
}): string {
  return `I, ${parts.endorser}, checked who ${parts.person} is in the way described here, and that this signing key, with the digits ${parts.keyDigits}, is the one that ${parts.person} enrolled at ${parts.laboratory}. I am not that person.`
}
