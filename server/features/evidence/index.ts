export { evidenceJobs } from './jobs.ts'
export { closePrinter, warmPrinter } from './printer.ts'
export { renditionsOf } from './repository.ts'
export { renderEvidence } from './use-cases/render-evidence.ts'
