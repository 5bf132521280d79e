import { Problem } from '../contract/problems.ts'

/** Refuses values that cannot be computed with: what is wrong and what to do, at the field it concerns. */
export function refuse(pointer: string, detail: string): never {
  throw new Problem('invalid-values', detail, { errors: [{ pointer, detail }] })
}
