import { phraseWords } from './word-list.ts'

export const wordsInPhrase = 6
export const phraseBits = wordsInPhrase * Math.log2(phraseWords.length)

/**
 * Six words drawn with equal chance from the list by the browser's cryptographic generator. The list has 2048 words, a
 * power of two, so that the low 11 bits of a random number give each word the same chance.
 */
export function drawPhrase(
  random: (into: Uint16Array<ArrayBuffer>) => void = (into) => void crypto.getRandomValues(into),
): string {
  const drawn = new Uint16Array(wordsInPhrase)
  random(drawn)
  return Array.from(drawn, (number) => phraseWords[number % phraseWords.length]).join(' ')
}
