export { buildBundle, publicKeyPem } from './build-bundle.ts'
export type {
  Bundle,
  BundleFile,
  BundleInput,
  EntryInput,
  KeyInput,
  RawFileInput,
  SignatureInput,
} from './bundle-input.ts'
export type { BundleDescription, LeftOut } from './description.ts'
export { byEntryNumber, topFolderName, type BundleScope } from './layout.ts'
export { reachedKeys, type ReachedKey } from './reached-keys.ts'
export { renderedPayload } from './rendered.ts'
