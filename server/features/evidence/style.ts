import { fringeUrl } from './fringe-mark.ts'

/** Style of a sealed sheet on screen and paper (A4): black and greys; look.md section 9. */
export const sheetCss = `
html{background:#fff;color:#000;font:9.5pt/1.5 'Source Serif 4 Variable',serif}
body{margin:0 auto;max-width:166mm}
h1{font-size:19pt;line-height:1.2;margin:2mm 0 1mm;font-weight:600}
h2{font:600 10.5pt/1.3 'Schibsted Grotesk Variable',sans-serif;margin:6mm 0 2mm;break-after:avoid}
h3,h4{font-size:10.5pt;margin:4mm 0 1mm;break-after:avoid}
p{margin:0 0 2.4mm}
.meta,.run,.small,.demo,.files,.history,.signature,.seal,section.calculation header,.figures{font-family:'Schibsted Grotesk Variable',sans-serif;font-size:7.8pt;line-height:1.45}
.meta{margin-bottom:2mm;color:#222}
.demo{border:1px solid #000;padding:1.2mm 2mm;font-weight:600}
.run{border-block:1px solid #999;padding:1.5mm 0;margin:2mm 0}
.run+.run{border-top:0;margin-top:-2mm}
.fig{font-family:'Spline Sans Mono Variable',monospace;overflow-wrap:anywhere}
.small{font-size:7pt;margin:0 0 1mm;color:#222}
section.calculation{break-inside:avoid;border-top:3px solid #000;border-bottom:1px solid #999;margin:4mm 0;padding:1.5mm 0}
section.calculation header{display:flex;gap:3mm;align-items:baseline}
section.calculation header .from{margin-left:auto}
.plot svg{display:block;width:100%;height:auto;max-height:96mm}
table{border-collapse:collapse;margin:0 0 3mm;font-size:8.6pt}
td,th{border:1px solid #999;padding:.6mm 1.6mm;text-align:left;vertical-align:top}
td>p,th>p{margin:0}
thead{display:table-header-group}
sup,sub{line-height:0}
.figures td,.figures th{border:0;border-bottom:1px solid #d8d8d8;font-weight:400;padding:.4mm 4mm .4mm 0}
.files{width:100%}.files td,.files th{font-size:7pt}.files .digest td{border-top:0}
tr{break-inside:avoid}
.signatures{display:grid;grid-template-columns:1fr 1fr;gap:3mm 6mm}
.signature{break-inside:avoid;border-top:2px solid #000;padding-top:1.5mm}
.signature p{margin:0 0 .6mm}.signature .name{font-size:9.5pt;font-weight:600}
.signature blockquote{margin:1mm 0;padding-left:2mm;border-left:3px double #888;font-family:'Source Serif 4 Variable',serif;font-size:8.2pt}
.seal{break-inside:avoid;margin-top:5mm}
.seal-line{list-style:none;margin:0 0 2.5mm;padding:0;display:grid;grid-template-columns:repeat(4,1fr)}
.seal-line li{position:relative;display:flex;flex-direction:column;padding:6.5mm 3mm 0 0}
.seal-line li:not(:last-child)::before{content:"";position:absolute;left:6mm;right:0;top:2.6mm;border-top:1mm solid #000}
.seal-line .node{position:absolute;top:0;left:0}
.seal-line .mark{flex-direction:row;display:flex;gap:2mm;align-items:center;margin-top:1mm}
blockquote{margin:2mm 0 2mm 4mm}
pre{font:8pt/1.4 'Spline Sans Mono Variable',monospace;white-space:pre-wrap;border-left:1px solid #999;padding-left:2mm}
img{max-width:100%}figure{margin:3mm 0;break-inside:avoid}figcaption{font-size:8pt}
s{text-decoration:line-through}
.quoted-result{white-space:nowrap}
a{color:inherit}a[href^="http"]::after{content:" (" attr(href) ")";font-size:7pt;overflow-wrap:anywhere}
`

export interface PageWords {
  laboratory: string
  notebook: string
  number: string
  bodySha256: string
  demo: boolean
}

/** Running heads and feet: laboratory, notebook, sheet; all 64 digits, page n of m. */
export function pageCss({ laboratory, notebook, number, bodySha256, demo }: PageWords): string {
  const sans = "font:7.5pt 'Schibsted Grotesk Variable',sans-serif"
  const mono = "font:7pt/1.35 'Spline Sans Mono Variable',monospace"
  const digits = `${group(bodySha256.slice(0, 32))}\\a       ${group(bodySha256.slice(32))}`
  return `@page{size:A4;margin:21mm 22mm 22mm;
@top-left{content:${quoted(laboratory)};${sans};font-weight:600;border-bottom:1.2px solid #000;vertical-align:bottom;padding-bottom:1.4mm;margin-bottom:4mm}
@top-center{content:${quoted(notebook)};${sans};border-bottom:1.2px solid #000;vertical-align:bottom;padding-bottom:1.4mm;margin-bottom:4mm}
@top-right{content:${quoted(number)};${mono};border-bottom:1.2px solid #000;vertical-align:bottom;padding-bottom:1.4mm;margin-bottom:4mm}
@bottom-left{content:"sheet ${digits}";white-space:pre;${mono};border-top:1px solid #000;vertical-align:top;padding:1.4mm 0 0 11mm;margin-top:4mm;background:url(${fringeUrl(bodySha256)}) no-repeat 0 1.6mm/8.4mm 8.4mm;min-height:11mm}
@bottom-center{content:"${demo ? 'demonstration' : ''}";${sans};border-top:1px solid #000;vertical-align:top;padding-top:1.4mm;margin-top:4mm}
@bottom-right{content:counter(page) " of " counter(pages);${sans};border-top:1px solid #000;vertical-align:top;padding-top:1.4mm;margin-top:4mm}}`
}

const group = (hex: string) => (hex.match(/.{8}/g) ?? []).join(' ')

/** A CSS string that can hold any text: whatever is no plain letter or digit is written as an escape. */
function quoted(words: string): string {
  return `"${words.replace(/[^A-Za-z0-9 ,.-]/gu, (c) => `\\${(c.codePointAt(0) ?? 0).toString(16)} `)}"`
}
