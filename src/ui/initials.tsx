import { classNames } from './class-names.ts'

/** First letters of the first and last name; a title before the name does not count. */
export function initialsOf(name: string): string {
  const words = name.split(/\s+/).filter((word) => word && !/^(dr|prof)\.?$/i.test(word))
  const first = words[0]?.[0] ?? '?'
  const last = words.length > 1 ? (words[words.length - 1]?.[0] ?? '') : ''
  return (first + last).toUpperCase()
}

/** A person as a small bevelled tile. The name stands beside it in words. */
export function Initials({ name, small = false }: { name: string; small?: boolean }) {
  return (
    <span className={classNames('hs-initials', small && 'hs-initials-small')} aria-hidden>
      {initialsOf(name)}
    </span>
  )
}
