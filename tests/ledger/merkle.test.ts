import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fromBase64, fromHex, toHex } from '../../server/ledger-format/digest.ts'
import {
  appendLeaf,
  emptyFrontier,
  leafHash,
  MerkleTree,
  rootOf,
  rootOfFrontier,
  verifyConsistency,
  verifyInclusion,
} from '../../server/ledger-format/merkle.ts'
import { referencePath } from '../support/reference.ts'

const vectors = referencePath('vectors/merkle/testdata')

interface Vector {
  desc: string
  leafIdx: number
  treeSize: number
  leafHash: string | null
  root: string | null
  size1: number
  size2: number
  root1: string | null
  root2: string | null
  proof: string[] | null
  wantErr: boolean
}

function suite(kind: string): Vector[] {
  return readdirSync(join(vectors, kind), { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.json'))
    .map((name) => JSON.parse(readFileSync(join(vectors, kind, name), 'utf8')) as Vector)
}
const bytes = (base64: string | null) => fromBase64(base64 ?? '')

/** Leaves and roots of the public test tree (standards.md B5; origin in vectors/ORIGIN.md). */
const leaves = [
  '',
  '00',
  '10',
  '2021',
  '3031',
  '40414243',
  '5051525354555657',
  '606162636465666768696a6b6c6d6e6f',
]
const hashes = leaves.map((leaf) => leafHash(fromHex(leaf)))
const roots: [size: number, root: string][] = [
  [0, 'e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855'],
  [1, '6e340b9cffb37a989ca544e6bb780a2c78901d3fb33738768511a30617afa01d'],
  [3, 'aeb6bcfe274b70a14fb067a5e5578264db0fa9b51af5e0ba159158f329e06e77'],
  [5, '4e3bbb1f7b478dcfe71fb631631519a3bca12c9aefca1612bfce4c13a86264d4'],
  [7, 'ddb89be403809e325750d3d263cd78929c2942b7942a34b77e122c9594a74c8c'],
  [8, '5dc9da79a70659a9ad559cb701ded9a2ab9d823aad2f4960cfe370eff4604328'],
]

describe('Merkle tree of RFC 9162', () => {
  it.each(roots)('has the published root of %d leaves, from the leaves and from a frontier', (size, root) => {
    expect(toHex(rootOf(hashes.slice(0, size)))).toBe(root)
    expect(toHex(new MerkleTree(hashes).root(size))).toBe(root)
    const frontier = hashes.slice(0, size).reduce(appendLeaf, emptyFrontier)
    expect(toHex(rootOfFrontier(frontier))).toBe(root)
  })

  it('agrees with the published inclusion suite', () => {
    const cases = suite('inclusion')
    const wrong = cases.filter(
      (v) =>
        verifyInclusion(
          bytes(v.leafHash),
          v.leafIdx,
          v.treeSize,
          (v.proof ?? []).map(bytes),
          bytes(v.root),
        ) === v.wantErr,
    )
    expect(wrong.map((v) => v.desc)).toEqual([])
    expect(cases).toHaveLength(98)
  })

  it('agrees with the published consistency suite, empty first trees aside', () => {
    const cases = suite('consistency')
    const wrong = cases.filter(
      (v) =>
        verifyConsistency(v.size1, bytes(v.root1), v.size2, bytes(v.root2), (v.proof ?? []).map(bytes)) ===
        v.wantErr,
    )
    // The suite takes equal trees for consistent when they are empty, or when their roots are no hashes at all; an empty tree
    // proves nothing, and a root has 32 bytes, so both are refused here.
    const comparable = (v: Vector) => v.size1 > 0 && bytes(v.root1).length === 32
    expect(wrong.filter(comparable).map((v) => v.desc)).toEqual([])
    expect(cases).toHaveLength(98)
  })

  it('proves every leaf and every earlier size of trees of 1 to 33 leaves, and nothing else', () => {
    const many = Array.from({ length: 33 }, (_, i) => leafHash(Uint8Array.of(i)))
    const tree = new MerkleTree(many)
    for (let size = 1; size <= many.length; size++) {
      const root = rootOf(many.slice(0, size))
      for (let i = 0; i < size; i++) {
        const path = tree.inclusionPath(i, size)
        expect(verifyInclusion(tree.leaf(i), i, size, path, root)).toBe(true)
        expect(verifyInclusion(tree.leaf(i), i + 1, size, path, root)).toBe(false)
        const consistency = tree.consistencyPath(i + 1, size)
        expect(verifyConsistency(i + 1, tree.root(i + 1), size, root, consistency)).toBe(true)
        if (i + 1 < size) expect(verifyConsistency(i + 1, root, size, root, consistency)).toBe(false)
      }
    }
  })

  it('refuses any changed proof', () => {
    const tree = new MerkleTree(Array.from({ length: 100 }, (_, i) => leafHash(Uint8Array.of(i))))
    fc.assert(
      fc.property(fc.nat(99), fc.nat(), fc.nat(255), (index, place, flip) => {
        const path = tree.inclusionPath(index)
        const hash = path[place % path.length]?.slice() ?? new Uint8Array(32)
        hash[place % 32] = (hash[place % 32] ?? 0) ^ (flip || 1)
        const changed = path.map((other, i) => (i === place % path.length ? hash : other))
        return !verifyInclusion(tree.leaf(index), index, 100, changed, tree.root())
      }),
    )
  })

  it('says where a size or an index is outside', () => {
    const tree = new MerkleTree(hashes)
    expect(() => tree.inclusionPath(8)).toThrow(RangeError)
    expect(() => tree.inclusionPath(5, 5)).toThrow(RangeError)
    expect(() => tree.consistencyPath(0)).toThrow(RangeError)
    expect(() => tree.root(9)).toThrow(RangeError)
  })
})
