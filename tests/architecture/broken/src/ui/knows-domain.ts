import { one } from '../features/a/one.ts'

export const knowsDomain = one
