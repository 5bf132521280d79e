import { memo, useId } from 'react'
import { fringeHalves, type FringeHalf } from './fringe-geometry.ts'

const round = (value: number) => Math.round(value * 100) / 100

type MarkSize = 18 | 20 | 26 | 30 | 34 | 52 | 72 | 84

/** The mark of a SHA-256 digest. Eight digits stand beside it wherever it is shown. */
export const FringeMark = memo(function FringeMark({
  sha256,
  size = 26,
}: {
  sha256: string
  size?: MarkSize
}) {
  const id = useId()
  const { upper, lower } = fringeHalves(sha256)
  return (
    <svg
      className="hs-fringe"
      width={size}
      height={size}
      viewBox="0 0 48 48"
      role="img"
      aria-label={`Fringe mark for ${sha256.slice(0, 8)}`}
    >
      <defs>
        <clipPath id={`${id}-upper`}>
          <path d={upperTriangle} />
        </clipPath>
        <clipPath id={`${id}-lower`}>
          <path d={lowerTriangle} />
        </clipPath>
      </defs>
      <g fill="none" stroke="currentColor">
        <Half half={upper} triangle={upperTriangle} clip={`${id}-upper`} />
        <Half half={lower} triangle={lowerTriangle} clip={`${id}-lower`} />
      </g>
      <path
        d="M.75 .75H47.25V47.25H.75ZM.75 47.25L47.25 .75"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
      />
    </svg>
  )
})

const upperTriangle = 'M1 1H46L1 46Z'
const lowerTriangle = 'M47 2V47H2Z'

function Half({ half, triangle, clip }: { half: FringeHalf; triangle: string; clip: string }) {
  return (
    <g clipPath={`url(#${clip})`}>
      {half.darkGround && <path d={triangle} fill="currentColor" stroke="none" />}
      <g stroke={half.darkGround ? 'var(--hs-fringe-ground, var(--hs-paper))' : 'currentColor'}>
        {half.fringes.map((fringe) => (
          <circle
            key={fringe.radius}
            cx={round(half.centre.x)}
            cy={round(half.centre.y)}
            r={round(fringe.radius)}
            strokeWidth={round(fringe.width)}
          />
        ))}
      </g>
    </g>
  )
}
