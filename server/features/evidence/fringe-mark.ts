import { fringeHalves, type FringeHalf } from '../../contract/fringe-geometry.ts'

const round = (value: number) => Math.round(value * 100) / 100
const upperTriangle = 'M1 1H46L1 46Z'
const lowerTriangle = 'M47 2V47H2Z'

/** The mark of a digest as a standalone SVG in ink: it helps the eye, the digits beside it decide. */
export function fringeSvg(sha256: string): string {
  const { upper, lower } = fringeHalves(sha256)
  const halves: [string, FringeHalf, string][] = [
    ['u', upper, upperTriangle],
    ['l', lower, lowerTriangle],
  ]
  const clips = halves
    .map(([id, , triangle]) => `<clipPath id="${id}"><path d="${triangle}"/></clipPath>`)
    .join('')
  const drawn = halves.map(([id, half, triangle]) => halfSvg(id, half, triangle)).join('')
  const frame =
    '<path d="M.75 .75H47.25V47.25H.75ZM.75 47.25L47.25 .75" fill="none" stroke="#000" stroke-width="1.5"/>'
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 48 48" width="48" height="48"><defs>${clips}</defs><g fill="none">${drawn}</g>${frame}</svg>`
}

function halfSvg(id: string, { darkGround, centre, fringes }: FringeHalf, triangle: string): string {
  const circles = fringes.map(
    ({ radius, width }) =>
      `<circle cx="${round(centre.x)}" cy="${round(centre.y)}" r="${round(radius)}" stroke-width="${round(width)}"/>`,
  )
  const ground = darkGround ? `<path d="${triangle}" fill="#000"/>` : ''
  return `<g clip-path="url(#${id})">${ground}<g stroke="${darkGround ? '#fff' : '#000'}">${circles.join('')}</g></g>`
}

/** The same as a data URL, so that several marks in one page share no ids. */
export function fringeUrl(sha256: string): string {
  return `data:image/svg+xml;base64,${Buffer.from(fringeSvg(sha256)).toString('base64')}`
}
