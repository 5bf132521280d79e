import { createQueryClient } from '../lib/query-client.ts'

/** The one cache of the program: loaders fill it, pages read it. */
export const queryClient = createQueryClient()
