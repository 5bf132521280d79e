import { describe, expect, test } from 'vitest'
import { isCommon } from '../../src/features/signatures/passphrase/common-passphrases.ts'
import { drawPhrase, phraseBits, wordsInPhrase } from '../../src/features/signatures/passphrase/six-words.ts'
import { judgePassphrase, passphraseBits } from '../../src/features/signatures/passphrase/strength.ts'
import { phraseWords } from '../../src/features/signatures/passphrase/word-list.ts'

describe('six words', () => {
  test('the list has 2048 different words, so that a word carries 11 bits and six 66', () => {
    expect(new Set(phraseWords).size).toBe(2048)
    expect(phraseWords.every((word) => /^[a-z]{4,7}$/.test(word))).toBe(true)
    expect(phraseBits).toBe(66)
  })

  test('each random number picks its own word; all words can be drawn', () => {
    const drawn = new Set<string>()
    for (let first = 0; first < 2048; first++) {
      const phrase = drawPhrase((into) => void into.fill(first + 2048 * (first % 31)))
      const words = phrase.split(' ')
      expect(words).toHaveLength(wordsInPhrase)
      drawn.add(words[0]!)
    }
    expect(drawn.size).toBe(2048)
  })

  test('two draws differ', () => {
    expect(drawPhrase()).not.toBe(drawPhrase())
  })

  test('a drawn phrase is long enough and strong', () => {
    for (let i = 0; i < 50; i++) {
      const { refusal, bits } = judgePassphrase(drawPhrase())
      expect(refusal).toBeNull()
      // Chance may repeat a word, which costs the guesser nothing: one word less at the worst here.
      expect(bits).toBeGreaterThanOrEqual(50)
    }
  })
})

describe('what is refused', () => {
  test('14 characters are too few, 15 are enough; characters are counted after NFKC, not bytes', () => {
    expect(judgePassphrase('kV7!pQ2#xW9$mZ').refusal).toMatch('14 of at least 15')
    expect(judgePassphrase('kV7!pQ2#xW9$mZ&').refusal).toBeNull()
    // U+FB03 is one sign that NFKC makes three letters (Unicode, UAX 15).
    expect(judgePassphrase('kV7!pQ2#xW9$\ufb03').refusal).toBeNull()
    expect(judgePassphrase('\u{1F52C}'.repeat(14)).refusal).toMatch('14 of')
  })

  test.each([
    'passwordpassword',
    'Password Password',
    'p@ssword-p@ssword',
    'correct horse battery staple',
    '123456789012345',
    'qwertyuiopasdfg',
    'aaaaaaaaaaaaaaaaaaaa',
    'abcabcabcabcabcabc',
    'password19991999',
    'qwertyuiop1234567890',
  ])('%s', (passphrase) => {
    expect(judgePassphrase(passphrase).refusal).not.toBeNull()
  })

  test('capitals, spaces and signs do not hide a common passphrase', () => {
    expect(isCommon('Correct-Horse  BATTERY staple!')).toBe(true)
    expect(isCommon('correct horse battery stapler')).toBe(false)
  })
})

describe('strength', () => {
  test('random letters count their full 4.7 bits each, less where they happen to spell something', () => {
    const bits = passphraseBits('xkzvqjwpbgtmhcf')
    expect(bits).toBeCloseTo(15 * Math.log2(26), 5)
  })

  test('what repeats adds next to nothing', () => {
    const once = passphraseBits('vqxkzjwp')
    expect(passphraseBits('vqxkzjwpvqxkzjwp')).toBeLessThan(once + 2)
  })

  test('more words are never weaker', () => {
    const words = phraseWords.slice(100, 1700).filter((_, at) => at % 200 === 0)
    const bits = words.map((_, at) => passphraseBits(words.slice(0, at + 1).join(' ')))
    expect(bits.every((each, at) => at === 0 || each > bits[at - 1]!)).toBe(true)
  })
})
