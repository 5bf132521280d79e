export { AnchorsSection, HeadSection } from './components/anchors.tsx'
export { LedgerEvents, type SubjectFilter } from './components/ledger-events.tsx'
export { VerificationResult } from './components/verification-result.tsx'
