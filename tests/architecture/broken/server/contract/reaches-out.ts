import { db } from '../platform/db.ts'

export const reachesOut = db
