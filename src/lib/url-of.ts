import { endpoints, type EndpointName } from '../../server/contract/endpoints.ts'

const apiRoot = '/api/v1'

export type PathValues = Record<string, string | number>
export type QueryValues = Record<string, string | number | boolean | undefined>

/** Address of an endpoint with its path parameters and query filled in. */
export function urlOf(name: EndpointName, params: PathValues = {}, query: QueryValues = {}): string {
  const path = endpoints[name].path.replace(/:(\w+)/g, (_, key: string) => {
    const value = params[key]
    if (value === undefined) throw new Error(`${name} needs the path parameter ${key}`)
    return encodeURIComponent(value)
  })
  const given = Object.entries(query).filter(([, value]) => value !== undefined)
  const search = new URLSearchParams(given.map(([key, value]) => [key, String(value)]))
  return apiRoot + path + (given.length > 0 ? `?${search}` : '')
}
