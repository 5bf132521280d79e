/** The maker's mark: a square cut by the 45° line, solid above and ruled below. */
export function BrandMark({ size = 26 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 26 26" aria-hidden>
      <path d="M2 2H24L2 24Z" fill="currentColor" />
      <g stroke="currentColor" strokeWidth="1.3" fill="none">
        <path d="M24 5.5V24H5.5" />
        <path d="M24 9.6L9.6 24M24 14.2L14.2 24M24 18.8L18.8 24" />
      </g>
    </svg>
  )
}
