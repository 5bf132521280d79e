import type { ReactNode } from 'react'
import type { Part } from './variants.ts'

const hatch = 'M-12 1l-4 5M-6 1l-4 5M0 1l-4 5M6 1l-4 5M12 1l-4 5'

/** Optical parts about the origin, light from left to right. The half-silvered plane runs "\": it sends light down. */
const drawings: Record<Exclude<Part['kind'], 'detector' | 'analyser'>, ReactNode> = {
  source: (
    <>
      <circle className="hs-optic" r="13" />
      <circle className="hs-optic-core" r="3.5" />
      <path
        className="hs-optic-fine"
        d="M0-13V-8M0 13V8M-13 0H-8M9.2-9.2L5.7-5.7M-9.2-9.2L-5.7-5.7M9.2 9.2L5.7 5.7M-9.2 9.2L-5.7 5.7"
      />
    </>
  ),
  filter: (
    <>
      <rect className="hs-optic" x="-4" y="-17" width="8" height="34" />
      <path className="hs-optic-fine" d="M-4-9L4-13M-4-3L4-7M-4 3L4-1M-4 9L4 5M-4 15L4 11" />
    </>
  ),
  density: <path className="hs-optic-glass" d="M-3-17H3L7 17H-7Z" />,
  crystal: <path className="hs-optic-glass" d="M-16-9H12L16 9H-12Z" />,
  splitter: (
    <>
      <rect className="hs-optic" x="-17" y="-17" width="34" height="34" />
      <path className="hs-optic-glass" d="M-17-17L17 17H-17Z" />
      <path className="hs-optic-line" d="M-17-17L17 17" />
    </>
  ),
  mirror: (
    <>
      <path className="hs-optic-line" d="M-14 0H14" />
      <path className="hs-optic-fine" d={hatch} />
    </>
  ),
  delay: (
    <>
      <path className="hs-optic-line" d="M-16-14V14M16-14V14" />
      <path className="hs-optic-fine" d="M-12 0H12M-8-4L-12 0L-8 4M8-4L12 0L8 4" />
    </>
  ),
  coincidence: (
    <>
      <circle className="hs-optic" r="17" />
      <path className="hs-optic-line" d="M-4-9V9M4-9V9" />
    </>
  ),
  shutter: (
    <>
      <rect className="hs-optic-core" x="-4" y="-19" width="8" height="38" />
      <path className="hs-optic-fine" d="M-10-19H10" />
    </>
  ),
}

/** One part at its place. `angle` is that of an analyser, in degrees from the vertical. */
export function PartDrawing({ part, angle = 0 }: { part: Part; angle?: number }) {
  const turn = part.turn ? ` rotate(${part.turn})` : ''
  return (
    <g transform={`translate(${part.at[0]} ${part.at[1]})${turn}`}>
      {part.kind === 'detector' ? (
        <Detector part={part} />
      ) : part.kind === 'analyser' ? (
        <Analyser angle={angle} />
      ) : (
        drawings[part.kind]
      )}
    </g>
  )
}

function Analyser({ angle }: { angle: number }) {
  return (
    <>
      <circle className="hs-optic" r="14" />
      <path
        className="hs-optic-line"
        transform={`rotate(${angle})`}
        d="M0-10V10M-3-7L0-10L3-7M-3 7L0 10L3 7"
      />
    </>
  )
}

/** A D with its channel number, which stays upright when the D is turned. */
function Detector({ part }: { part: Part }) {
  const channel = part.channel ?? 1
  return (
    <>
      <path className={`hs-detector hs-detector-${channel}`} d="M-9-15H-3A15 15 0 0 1-3 15H-9Z" />
      <text
        className="hs-detector-number"
        textAnchor="middle"
        transform={part.turn ? `rotate(${-part.turn}) translate(0 3)` : 'translate(-1 4)'}
      >
        {channel === 3 ? 'H' : channel}
      </text>
    </>
  )
}
