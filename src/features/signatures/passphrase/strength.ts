import { isCommon } from './common-passphrases.ts'
import { phraseWords } from './word-list.ts'

export const leastLength = 15

/** One attempt costs scrypt with 128 MiB; a large farm of graphics cards makes about 10^4 a second (estimate, rulings B7). */
const guessesPerSecond = 1e4

const words: ReadonlySet<string> = new Set(phraseWords)
const tried: ReadonlySet<string> = new Set(
  'password passphrase secret letmein welcome admin love monkey dragon master hello qwerty sunshine princess football login test demo laboratory photon notebook the and you for with this that have are was not'.split(
    ' ',
  ),
)
const longestWord = 12
const rows = ['qwertyuiop', 'asdfghjkl', 'zxcvbnm', '1234567890', 'abcdefghijklmnopqrstuvwxyz']
const runs = [...rows, ...rows.map((row) => [...row].reverse().join(''))]

function costOfCharacter(character: string): number {
  if (/\d/.test(character)) return Math.log2(10)
  if (/[a-z]/.test(character)) return Math.log2(26)
  // What stands between words is the same throughout; it adds nothing.
  return /[ \-_.,]/.test(character) ? 0 : 5.5
}

/** Bits of a piece that a guesser takes as one: a word, a row of keys, the same sign over and over, a year. Null: none. */
function costOfPiece(piece: string): number | null {
  if (tried.has(piece)) return 6
  if (words.has(piece)) return 11
  if (piece.length < 3) return null
  if (/^(19|20)\d\d$/.test(piece)) return 7
  if ([...piece].every((each) => each === piece[0]))
    return costOfCharacter(piece[0] ?? '') + Math.log2(piece.length)
  if (runs.some((run) => run.includes(piece))) return 5 + Math.log2(piece.length)
  return null
}

/** Whether what stands from `at` on for `length` signs repeats what stands right before it. */
function repeats(text: string, at: number, length: number): boolean {
  return at >= length && text.slice(at - length, at) === text.slice(at, at + length)
}

/**
 * Strength of a passphrase in bits: the cheapest way to put it together from pieces that guessers try. An estimate that
 * leans low; it cannot know that a sentence is from a book.
 */
export function passphraseBits(passphrase: string): number {
  const given = passphrase.normalize('NFKC')
  const text = given.toLowerCase()
  const least = new Array<number>(text.length + 1).fill(Number.POSITIVE_INFINITY)
  least[0] = 0
  for (let at = 0; at < text.length; at++) {
    const before = least[at] ?? 0
    for (let length = 1; length <= Math.min(longestWord * 2, text.length - at); length++) {
      const cost = costAt(text, at, length)
      if (cost !== null) least[at + length] = Math.min(least[at + length] ?? 0, before + cost)
    }
  }
  const capitals =
    given === text ? 0 : Math.min(6, [...given].filter((each) => each !== each.toLowerCase()).length)
  return (least[text.length] ?? 0) + capitals
}

function costAt(text: string, at: number, length: number): number | null {
  const piece = text.slice(at, at + length)
  if (length > 1 && repeats(text, at, length)) return 1
  return length === 1 ? costOfCharacter(piece) : costOfPiece(piece)
}

export interface Judgement {
  bits: number
  /** A sentence when it may not be used, else null. */
  refusal: string | null
  /** What the strength means, for a passphrase that may be used. */
  meaning: string
}

/** Whether a passphrase may be used and what it withstands. */
export function judgePassphrase(passphrase: string): Judgement {
  const bits = Math.floor(passphraseBits(passphrase))
  return { bits, refusal: refusalOf(passphrase, bits), meaning: meaningOf(bits) }
}

function refusalOf(passphrase: string, bits: number): string | null {
  const length = [...passphrase.normalize('NFKC')].length
  if (length < leastLength) return `${length} of at least ${leastLength} characters.`
  if (isCommon(passphrase)) return 'This passphrase is among those that are tried first. Take another one.'
  if (bits < 30)
    return 'This is put together from parts that are tried first, and would fall in a day. Take another one.'
  return null
}

/** How long whoever had stolen everything that is stored would need on average, in words. */
function meaningOf(bits: number): string {
  const years = 2 ** (bits - 1) / guessesPerSecond / 3.156e7
  if (years > 1e6) return 'out of reach of guessing, even for whoever stole all that is stored'
  if (years >= 1)
    return `about ${years < 10 ? Math.round(years) : Number(years.toPrecision(1))} years of guessing for whoever stole all that is stored`
  const days = years * 365
  return days >= 1
    ? `about ${Number(days.toPrecision(1))} days of guessing for whoever stole all that is stored`
    : 'hours of guessing for whoever stole all that is stored'
}
