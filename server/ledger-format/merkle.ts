import { sha256 } from '@noble/hashes/sha2.js'
import { concatBytes } from '@noble/hashes/utils.js'
import { sameBytes } from './bytes.ts'

/*
 * Merkle tree of RFC 9162 section 2.1 over SHA-256. Hashes are 32 bytes; tree sizes are counts of leaves; a leaf index is
 * sequence - 1. Sizes are divided, not shifted, so that they may pass 2^31.
 */

export function leafHash(data: Uint8Array): Uint8Array {
  return sha256(concatBytes(Uint8Array.of(0), data))
}

export function nodeHash(left: Uint8Array, right: Uint8Array): Uint8Array {
  return sha256(concatBytes(Uint8Array.of(1), left, right))
}

/** Largest power of two below n (n > 1): where a tree of n leaves splits. */
function splitOf(n: number): number {
  let k = 1
  while (k * 2 < n) k *= 2
  return k
}

/** Root of the tree over leaf hashes; the empty tree has the hash of nothing. */
export function rootOf(leaves: readonly Uint8Array[]): Uint8Array {
  return new MerkleTree(leaves).root()
}

/**
 * A tree over leaf hashes that keeps the roots of its full subtrees, so that proofs against any earlier size cost a few
 * hashes each.
 */
export class MerkleTree {
  /** levels[h][i]: root of the 2^h leaves from i·2^h on. */
  private readonly levels: Uint8Array[][]

  constructor(leaves: readonly Uint8Array[]) {
    this.levels = [[...leaves]]
    for (let level = this.levels[0]; level !== undefined && level.length > 1; level = this.levels.at(-1)) {
      const above: Uint8Array[] = []
      for (let i = 0; i + 1 < level.length; i += 2) above.push(nodeHash(at(level, i), at(level, i + 1)))
      this.levels.push(above)
    }
  }

  get size(): number {
    return this.levels[0]?.length ?? 0
  }

  /** Hash of the leaf at an index (sequence - 1). */
  leaf(index: number): Uint8Array {
    return at(at(this.levels, 0), index)
  }

  /** Root of the first `size` leaves. */
  root(size = this.size): Uint8Array {
    this.checkSize(size)
    return size === 0 ? sha256(new Uint8Array()) : this.range(0, size)
  }

  /** Hashes from the sibling of a leaf up to the root's child (section 2.1.3.1), in the tree of the first `size` leaves. */
  inclusionPath(index: number, size = this.size): Uint8Array[] {
    this.checkSize(size)
    if (!(index >= 0 && index < size)) throw new RangeError(`Leaf ${index} is outside a tree of ${size}.`)
    return this.pathIn(index, 0, size)
  }

  /** Proof that the tree of the first `to` leaves continues that of the first `from` (section 2.1.4.1). */
  consistencyPath(from: number, to = this.size): Uint8Array[] {
    this.checkSize(to)
    if (!(from > 0 && from <= to)) throw new RangeError(`Size ${from} is outside a tree of ${to}.`)
    return this.subProof(from, 0, to, true)
  }

  private checkSize(size: number): void {
    if (!(size >= 0 && size <= this.size))
      throw new RangeError(`The tree has ${this.size} leaves, not ${size}.`)
  }

  private pathIn(index: number, start: number, count: number): Uint8Array[] {
    if (count === 1) return []
    const k = splitOf(count)
    return index < k
      ? [...this.pathIn(index, start, k), this.range(start + k, count - k)]
      : [...this.pathIn(index - k, start + k, count - k), this.range(start, k)]
  }

  private subProof(size: number, start: number, count: number, whole: boolean): Uint8Array[] {
    if (size === count) return whole ? [] : [this.range(start, count)]
    const k = splitOf(count)
    return size <= k
      ? [...this.subProof(size, start, k, whole), this.range(start + k, count - k)]
      : [...this.subProof(size - k, start + k, count - k, false), this.range(start, k)]
  }

  /** Root of `count` leaves from `start` on, which is a multiple of the power of two at or above `count`. */
  private range(start: number, count: number): Uint8Array {
    if (isPowerOfTwo(count)) return at(at(this.levels, Math.log2(count)), start / count)
    const k = splitOf(count)
    return nodeHash(this.range(start, k), this.range(start + k, count - k))
  }
}

function at<T>(list: readonly T[], index: number): T {
  const item = list[index]
  if (item === undefined) throw new RangeError(`Nothing stands at ${index}.`)
  return item
}

const isHash = (bytes: Uint8Array) => bytes.length === 32
const isOdd = (n: number) => n % 2 === 1
const half = (n: number) => Math.floor(n / 2)

/** Root to which a proof leads (section 2.1.3.2), or null when its length does not fit the position. */
export function rootOfInclusion(
  leaf: Uint8Array,
  index: number,
  treeSize: number,
  path: readonly Uint8Array[],
): Uint8Array | null {
  if (!(index >= 0 && index < treeSize) || !isHash(leaf) || !path.every(isHash)) return null
  let [fn, sn, root] = [index, treeSize - 1, leaf]
  for (const hash of path) {
    if (sn === 0) return null
    if (isOdd(fn) || fn === sn) {
      root = nodeHash(hash, root)
      while (fn !== 0 && !isOdd(fn)) [fn, sn] = [half(fn), half(sn)]
    } else root = nodeHash(root, hash)
    ;[fn, sn] = [half(fn), half(sn)]
  }
  return sn === 0 ? root : null
}

export function verifyInclusion(
  leaf: Uint8Array,
  index: number,
  treeSize: number,
  path: readonly Uint8Array[],
  root: Uint8Array,
): boolean {
  const found = rootOfInclusion(leaf, index, treeSize, path)
  return found !== null && sameBytes(found, root)
}

/** Section 2.1.4.2; equal sizes need equal roots and an empty path; an empty first tree proves nothing and is refused. */
export function verifyConsistency(
  first: number,
  firstRoot: Uint8Array,
  second: number,
  secondRoot: Uint8Array,
  path: readonly Uint8Array[],
): boolean {
  if (!(first > 0 && first <= second) || ![firstRoot, secondRoot, ...path].every(isHash)) return false
  if (first === second) return path.length === 0 && sameBytes(firstRoot, secondRoot)
  const [start, ...rest] = isPowerOfTwo(first) ? [firstRoot, ...path] : path
  if (start === undefined || path.length === 0) return false
  let [fn, sn] = [first - 1, second - 1]
  while (isOdd(fn)) [fn, sn] = [half(fn), half(sn)]
  let [oldRoot, newRoot] = [start, start]
  for (const hash of rest) {
    if (sn === 0) return false
    if (isOdd(fn) || fn === sn) {
      oldRoot = nodeHash(hash, oldRoot)
      newRoot = nodeHash(hash, newRoot)
      while (fn !== 0 && !isOdd(fn)) [fn, sn] = [half(fn), half(sn)]
    } else newRoot = nodeHash(newRoot, hash)
    ;[fn, sn] = [half(fn), half(sn)]
  }
  return sn === 0 && sameBytes(oldRoot, firstRoot) && sameBytes(newRoot, secondRoot)
}

function isPowerOfTwo(n: number): boolean {
  return n === 1 || splitOf(n) * 2 === n
}

/**
 * What a growing tree must keep: the roots of its full subtrees, largest first, one for each binary one of `size`. The head
 * row stores it, so that a new head needs no old leaves.
 */
export interface Frontier {
  size: number
  roots: Uint8Array[]
}

export const emptyFrontier: Frontier = { size: 0, roots: [] }

/** The frontier with one leaf more; the given one stays as it is. */
export function appendLeaf(frontier: Frontier, leaf: Uint8Array): Frontier {
  const roots = [...frontier.roots]
  let hash = leaf
  for (let n = frontier.size; isOdd(n); n = half(n)) {
    const left = roots.pop()
    if (left === undefined) throw new Error(`A frontier of ${frontier.size} leaves lacks a root.`)
    hash = nodeHash(left, hash)
  }
  roots.push(hash)
  return { size: frontier.size + 1, roots }
}

export function rootOfFrontier(frontier: Frontier): Uint8Array {
  const [last, ...larger] = [...frontier.roots].reverse()
  if (last === undefined) return sha256(new Uint8Array())
  return larger.reduce((right, left) => nodeHash(left, right), last)
}
