import { byKeys } from '../record-order.ts'

/** True when a list stands in the order of its keys, the first key first. */
export function isInOrder<T>(items: readonly T[], ...keys: ((item: T) => string | number)[]): boolean {
  const compare = byKeys(...keys)
  return items.every((item, i) => i === 0 || compare(items[i - 1] as T, item) <= 0)
}

/** True when no two items have the same key. */
export function isUnique<T>(items: readonly T[], key: (item: T) => unknown): boolean {
  return new Set(items.map(key)).size === items.length
}

/** True when two lists hold the same texts, in any order. */
export function sameSet(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && [...a].sort().join('\n') === [...b].sort().join('\n')
}
