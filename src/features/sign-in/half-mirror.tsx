/** A short wave packet along x, centred on 0: eight cycles under a bell, 2.6 px a step. */
const packet = (() => {
  const points: string[] = []
  for (let x = -52; x <= 52; x += 1.3) {
    const y = 25 * Math.exp(-((x / 20) ** 2)) * Math.cos((2 * Math.PI * x) / 20)
    points.push(`${x.toFixed(1)} ${(-y).toFixed(1)}`)
  }
  return `M${points.join('L')}`
})()

const hatching = Array.from({ length: 36 }, (_, at) => `M${at * 10 - 184} 20l8-14`).join('')
const straight = [486, 498, 534, 558, 594, 606, 654, 666, 714, 726, 750, 762, 786, 810, 834, 846, 858]
const turned = [474, 510, 522, 546, 570, 582, 618, 630, 642, 678, 690, 702, 738, 774, 798, 822]
const ticks = (at: number[], y: number) => at.map((x) => `M${x} ${y}v26`).join('')
const scale = Array.from({ length: 34 }, (_, at) => `M${468 + at * 12} 652v${at % 5 === 0 ? 8 : 4}`).join('')

/** The drawing of the sign-in page: each photon goes straight on or turns down, never both. */
export function HalfMirror() {
  return (
    <svg
      className="hs-half-mirror"
      viewBox="0 0 936 900"
      preserveAspectRatio="xMinYMin slice"
      role="img"
      aria-label="Single photons meet a half-silvered mirror: each one goes either straight on or down, never both"
    >
      <path className="hs-hm-track" d="M0 264H936M324 264V900" />
      <g className="hs-hm-packets">
        {[76, 208].map((x) => (
          <path key={x} className="hs-hm-coming" d={packet} transform={`translate(${x} 264)`} />
        ))}
        {[468, 732, 864].map((x) => (
          <path key={x} className="hs-hm-straight" d={packet} transform={`translate(${x} 264)`} />
        ))}
        {[540, 936].map((y) => (
          <path key={y} className="hs-hm-turned" d={packet} transform={`translate(324 ${y}) rotate(90)`} />
        ))}
      </g>
      <g transform="translate(324 264) rotate(45)">
        <rect className="hs-hm-glass" x="-190" y="-2" width="380" height="22" />
        <path className="hs-hm-coating" d="M-190 -2H190" />
        <path className="hs-hm-hatching" d={hatching} />
      </g>
      <path className="hs-hm-click hs-hm-straight" d={ticks(straight, 500)} />
      <path className="hs-hm-click hs-hm-turned" d={ticks(turned, 560)} />
      <path className="hs-hm-axis" d={`M468 532H864M468 592H864M468 652H864${scale}`} />
      <g className="hs-hm-words">
        <text x="468" y="492">
          D1, straight on
        </text>
        <text x="468" y="552">
          D2, turned down
        </text>
        <text x="468" y="642">
          both at once: none
        </text>
      </g>
    </svg>
  )
}
