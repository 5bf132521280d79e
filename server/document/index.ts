export { checkDocument } from './check-document.ts'
export { DocumentError } from './document-error.ts'
export {
  documentSchema,
  emptyDocument,
  type DocumentMark,
  type DocumentNode,
  type NormalDocument,
} from './document.ts'
export { documentExtensions, drawnNodes, nodesWithId, plainExtensions } from './extensions.ts'
export { isAllowedHref } from './allowed-href.ts'
export { mathsOptions } from './maths.ts'
export { escapeHtml, renderHtml, type RenderParts } from './render-html.ts'
export { calculationsIn, filesIn, plainText, quotesIn, type Quote } from './walk.ts'
