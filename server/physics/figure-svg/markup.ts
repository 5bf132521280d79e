/** Text for SVG: the five characters that have a meaning there are escaped. */
export function escapeText(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;')
}

/** A coordinate with two decimals, without trailing zeros: the same picture gives the same bytes everywhere. */
export function coordinate(x: number): string {
  const text = x.toFixed(2).replace(/\.?0+$/, '')
  return text === '-0' ? '0' : text
}

type Attributes = Record<string, string | number | undefined>

/** An element; numbers become coordinates, what is undefined is left out. */
export function element(name: string, attributes: Attributes, content = ''): string {
  const written = Object.entries(attributes)
    .filter(([, value]) => value !== undefined)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? coordinate(value) : escapeText(value!)}"`)
    .join('')
  return content === '' ? `<${name}${written}/>` : `<${name}${written}>${content}</${name}>`
}

export const line = (x1: number, y1: number, x2: number, y2: number, attributes: Attributes): string =>
  element('line', { x1, y1, x2, y2, ...attributes })

/** A path through points, broken at gaps. */
export function pathThrough(points: (readonly [number, number] | null)[]): string {
  let path = ''
  let open = false
  for (const point of points) {
    if (point !== null) path += `${open ? 'L' : 'M'}${coordinate(point[0])} ${coordinate(point[1])}`
    open = point !== null
  }
  return path
}
