import { expect, inject, test } from 'vitest'
import { endpoints } from '../../server/contract/endpoints.ts'

const url = inject('url')

test('every endpoint of the table is served and described', async () => {
  const document = (await (await fetch(`${url}/api/v1/openapi.json`)).json()) as { openapi: string; paths: Record<string, Record<string, unknown>> }
  expect(document.openapi).toMatch(/^3\.1/)
  for (const endpoint of Object.values(endpoints)) {
    const described = document.paths[endpoint.path.replace(/:(\w+)/g, '{$1}')] ?? document.paths[`/api/v1${endpoint.path.replace(/:(\w+)/g, '{$1}')}`]
    expect(described?.[endpoint.method.toLowerCase()], `${endpoint.method} ${endpoint.path}`).toBeDefined()
    const path = endpoint.path.replace(/:seq|:n\b/g, '1').replace(/:\w+/g, '00000000-0000-4000-8000-000000000000')
    const answer = await fetch(`${url}/api/v1${path}`, { method: endpoint.method, headers: { origin: url } })
    // Not signed in: whoever is served says so; an address that nobody serves is 404.
    expect(answer.status, `${endpoint.method} ${endpoint.path}`).toBe(endpoint.access === 'anyone' ? 200 : 401)
  }
})
