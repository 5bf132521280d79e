import { QueryClientProvider } from '@tanstack/react-query'
import { RouterProvider } from 'react-router-dom'
import { UiRoot } from '../ui/ui-root.tsx'
import { queryClient } from './client.ts'
import { router } from './router.tsx'

export function App() {
  return (
    <QueryClientProvider client={queryClient}>
      <UiRoot>
        <RouterProvider router={router} />
      </UiRoot>
    </QueryClientProvider>
  )
}
