import { db } from '../platform/db.ts'

export const impure = db
