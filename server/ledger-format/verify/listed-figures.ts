import type { Json } from '../canonical-json.ts'
import { atPointerOrNull } from './json-pointer.ts'

type Lister = (result: Json, parameters: { [name: string]: Json }) => string[]

const fixed =
  (...pointers: string[]): Lister =>
  () =>
    pointers

const under = (result: Json, base: string): string[] => {
  const value = atPointerOrNull(result, base)
  return typeof value === 'object' && value !== null
    ? Object.keys(value).map((name) => `${base}/${name}`)
    : []
}

const each = (result: Json, base: string, ...names: string[]): string[] => {
  const list = atPointerOrNull(result, base)
  return Array.isArray(list) ? list.flatMap((_, i) => names.map((name) => `${base}/${i}/${name}`)) : []
}

const chsh = ['/s', '/sigmasAbove2', '/e/0', '/e/1', '/e/2', '/e/3']

/** definitions.md, "Figures of each kind": pointers in the order in which a record lists them. */
const figuresOfKind: Record<string, Lister> = {
  singles: (result) => each(result, '/channels', 'rate', 'sourceRate'),
  coincidences: (result) => {
    const used = atPointerOrNull(result, '/accidentals/used')
    return ['/rate', '/trueRate', `/accidentals/${String(used)}`, '/car', '/g2', '/klyshko/a', '/klyshko/b']
  },
  correlation: (result) => [
    ...['/g2Zero', '/g2ZeroCorrected', '/fit/g2Zero', '/fit/g2ZeroCorrected'],
    ...under(result, '/fit/parameters'),
  ],
  'pulsed-correlation': fixed('/g2Zero', '/g2ZeroCorrected', '/periodPs', '/sideScatter'),
  'long-correlation': fixed(),
  heralded: fixed('/g2', '/efficiencyA', '/efficiencyB'),
  statistics: fixed('/fano', '/mandelQ'),
  dip: fixed('/visibility', '/position', '/width', '/baseline'),
  polarisation: (result, parameters) =>
    parameters.mode === 'bases'
      ? each(result, '/bases', 'e', 'errorRate')
      : [...chsh, ...chsh.map((pointer) => `/corrected${pointer}`)],
  fringe: fixed('/visibility', '/period', '/phase', '/g1'),
  baseline: fixed('/diameterRad', '/beta'),
  series: (result) => ['/mean', ...under(result, '/parameters')],
  'source-model': fixed('/w1', '/w2', '/g2Zero', '/rates/a', '/rates/b', '/rates/coincidences'),
  plan: (_, parameters) => [(parameters.u ?? null) !== null ? '/durationS' : '/u', '/pairsPerHour'],
}

/** Pointers of the figures that a calculation of a kind must list, null values left out; null for a kind not known here. */
export function listedFigures(
  kind: string,
  result: Json,
  parameters: { [name: string]: Json },
): string[] | null {
  if (!Object.hasOwn(figuresOfKind, kind)) return null
  return (figuresOfKind[kind]?.(result, parameters) ?? []).filter(
    (pointer) => !isEmpty(atPointerOrNull(result, pointer)),
  )
}

function isEmpty(value: Json): boolean {
  if (value === null) return true
  return typeof value === 'object' && !Array.isArray(value) && (value.value ?? null) === null
}
