import { FringeMark } from './fringe-mark.tsx'

/** A digest as eight digits in two groups of four: "ab64 3d18". */
export function shortDigest(sha256: string): string {
  return `${sha256.slice(0, 4)} ${sha256.slice(4, 8)}`
}

/** All 64 digits in groups, for comparing by eye. */
export function groupedDigest(sha256: string, group: 4 | 8 = 4): string {
  return (sha256.match(new RegExp(`.{1,${group}}`, 'g')) ?? []).join(' ')
}

/** A fringe mark with its eight digits, or with all 64 where they must be compared. */
export function Digest({
  sha256,
  size = 18,
  full,
}: {
  sha256: string
  size?: 18 | 20 | 26 | 30 | 34 | 52
  full?: boolean
}) {
  return (
    <span className="hs-digest">
      <FringeMark sha256={sha256} size={size} />
      <span className={full ? 'hs-fig hs-digest-full' : 'hs-fig'}>
        {full ? groupedDigest(sha256) : shortDigest(sha256)}
      </span>
    </span>
  )
}
