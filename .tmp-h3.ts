import { readFileSync, writeFileSync, readdirSync } from 'node:fs'
import { createHash } from 'node:crypto'
import { verifyBundle, exitCodes } from '/work/main/server/ledger-format/verify/index.ts'
import { parseJson } from '/work/main/server/ledger-format/canonical-json.ts'
type Row = { name: string; path: string; ok: boolean | null; detail: string }
type A = { i: number; name: string; want: number; path: string; argv: string[]; code: number; rows: Row[]; anchors: string }
const index = JSON.parse(readFileSync('/tmp/attacks/index.json', 'utf8')) as A[]
const digester = (a: string) => { const h = createHash(a); return { update: (b: Uint8Array) => void h.update(b), hex: () => h.digest('hex') } }
const only = process.argv[2] ? process.argv.slice(2).map(Number) : null
const [part, parts] = [Number(process.env.PART ?? 0), Number(process.env.PARTS ?? 1)]
let bad = 0, soft = 0, n = 0
const t0 = Date.now()
for (const a of index) {
  if (a.want === 2) continue
  if (only && !only.includes(a.i)) continue
  if (a.i % parts !== part || a.i < Number(process.env.FROM ?? 0)) continue
  const bytes = new Uint8Array(readFileSync(a.argv[0]!))
  const o: any = { digester }
  let usage = false
  for (let k = 1; k < a.argv.length; k += 2) {
    const key = a.argv[k]!.slice(2), d = new Uint8Array(readFileSync(a.argv[k + 1]!))
    o[key] = key === 'crl' ? d : parseJson(d)
  }
  let code: number | string, rows: Row[] = [], anchors = ''
  try {
    const r = await verifyBundle({ size: bytes.length, read: (x, l) => bytes.subarray(x, x + l) }, o)
    code = exitCodes[r.verdict]; rows = r.checks.filter((c) => c.ok !== true || c.detail); anchors = r.anchors
  } catch (e) { code = 'crash ' + (e as Error).stack }
  n++
  const flag = a.want === 1 ? false : a.want === 3 ? null : undefined
  const names = flag === undefined || rows.some((r) => r.ok === flag && r.path.includes(a.path)) || rows.some((r) => r.ok === flag && (a.path === 'zip' && r.path.includes('zip') || `${r.name}: ${r.path}: ${r.detail}`.includes(a.path)))
  // paths that the judge fails and we do not, and the reverse
  const fold = (p: string) => p.replace(/ line \d+$/, '')
  const jf = new Set(a.rows.filter((r) => r.ok === false).map((r) => r.path)), of = new Set(rows.filter((r) => r.ok === false).map((r) => r.path))
  const missing = [...jf].filter((p) => !of.has(p)), extra = [...of].filter((p) => !jf.has(p))
  if (code !== a.want || !names) {
    bad++
    console.log(`BAD ${a.i} ${a.name} want ${a.want} got ${code} names ${names} (${a.path})`)
    if (only || bad < 60) for (const r of rows.slice(0, 6)) console.log('     ours', r.ok, r.name, r.path, r.detail.slice(0, 120))
  }
  if (missing.length || extra.length || (anchors && anchors !== a.anchors)) {
    soft++
    if (process.env.SOFT) console.log(`soft ${a.i} ${a.name}: judge only ${JSON.stringify(missing.slice(0, 4))} ours only ${JSON.stringify(extra.slice(0, 4))} ${anchors} ${a.anchors}`)
  }
}
console.log(`${n} run, ${bad} bad, ${soft} differ in paths, ${(Date.now() - t0) / n} ms each`)
