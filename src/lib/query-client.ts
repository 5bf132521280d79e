import { QueryClient } from '@tanstack/react-query'
import { mayPass } from './api-problem.ts'

/** One cache of server state. Problems that waiting cannot mend are shown at once, the others after two more tries. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 10_000,
        retry: (failures, error) => mayPass(error) && failures < 2,
      },
      mutations: { retry: false },
    },
  })
}
