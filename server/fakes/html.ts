/** Text as HTML text or attribute value. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.charCodeAt(0)};`)
}

/** A plain page of a stand-in: no script, no request to anywhere. */
export function page(title: string, body: string): string {
  return `<!doctype html>
<html lang="en-GB">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escapeHtml(title)}</title>
<style>
body { font: 1rem/1.5 system-ui, sans-serif; max-width: 44rem; margin: 3rem auto; padding: 0 1rem; color: #1c2420; background: #eef1ef }
h1 { font-size: 1.4rem; font-weight: 600 }
article, li { background: #fff; border: 1px solid #c3ccc7; padding: .75rem 1rem; margin: .75rem 0; list-style: none }
ul { padding: 0 } pre { white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; margin: .5rem 0 0 } small { color: #55615b }
</style></head>
<body><h1>${escapeHtml(title)}</h1>
${body}
</body></html>
`
}

/** No script, no frame, nothing from elsewhere. */
export const pageHeaders = {
  'Content-Security-Policy':
    "default-src 'none'; style-src 'unsafe-inline'; base-uri 'none'; frame-ancestors 'none'",
  'X-Content-Type-Options': 'nosniff',
  'Cache-Control': 'no-store',
}
