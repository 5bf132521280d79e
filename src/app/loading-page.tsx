/** Nothing but the table until the first page is here: it takes a moment, and a flash of words would be noise. */
export function LoadingPage() {
  return <div className="hs-ground" role="status" aria-label="Opening" />
}
