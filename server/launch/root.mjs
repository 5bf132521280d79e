import { fileURLToPath } from 'node:url'

/** The checkout this file belongs to. */
export const root = fileURLToPath(new URL('../../', import.meta.url)).replace(/\/$/, '')
