/** A signed-in person: calls the interface as a page would, with a cookie jar and the product's own Origin. */
export interface PersonClient {
  login: string
  /** The Cookie header as it stands now. */
  cookies(): string
  /** `path` without a leading slash is under /api/v1. */
  call<T = unknown>(
    method: string,
    path: string,
    body?: unknown,
    headers?: Record<string, string>,
  ): Promise<Answer<T>>
  /** The same, but throws unless it succeeds; answers the JSON. */
  ok<T>(method: string, path: string, body?: unknown, headers?: Record<string, string>): Promise<T>
}

export interface Answer<T = unknown> {
  status: number
  json: T
  bytes: Buffer
  headers: Headers
}

/** Cookies of one origin by name. */
class Jar {
  #cookies = new Map<string, string>()

  header(): string {
    return [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; ')
  }

  keep(answer: Response): void {
    for (const line of answer.headers.getSetCookie()) {
      const [pair = ''] = line.split(';')
      const at = pair.indexOf('=')
      this.#cookies.set(pair.slice(0, at), pair.slice(at + 1))
    }
  }
}

const MOST_HOPS = 8

/** Goes through the sign-in as a browser does; the sign-in stand-in answers at once for `login`. */
export async function signIn(
  url: string,
  login: string,
  start = '/auth/github',
): Promise<PersonClient & { landed: string }> {
  const jar = new Jar()
  let next = new URL(start, url)
  for (let hop = 0; hop < MOST_HOPS; hop++) {
    const own = next.origin === new URL(url).origin
    if (own && !next.pathname.startsWith('/auth/')) break
    if (!own) next.searchParams.set('login', login)
    const answer = await fetch(next, { redirect: 'manual', headers: own ? { cookie: jar.header() } : {} })
    if (own) jar.keep(answer)
    const location = answer.headers.get('location')
    if (location === null)
      throw new Error(`sign-in as ${login} stops at ${next.href}: ${answer.status} ${await answer.text()}`)
    next = new URL(location, next)
  }
  return { ...personClient(url, login, jar), landed: next.pathname + next.search }
}

function personClient(url: string, login: string, jar: Jar): PersonClient {
  async function call<T>(
    method: string,
    path: string,
    body?: unknown,
    headers: Record<string, string> = {},
  ): Promise<Answer<T>> {
    const form = body instanceof FormData
    const answer = await fetch(new URL(path.startsWith('/') ? path : `/api/v1/${path}`, url), {
      method,
      redirect: 'manual',
      headers: {
        cookie: jar.header(),
        origin: url,
        accept: 'application/json',
        ...(body !== undefined && !form ? { 'content-type': 'application/json' } : {}),
        ...headers,
      },
      body: body === undefined ? null : form ? body : JSON.stringify(body),
    })
    jar.keep(answer)
    const bytes = Buffer.from(await answer.arrayBuffer())
    const isJson = /json/.test(answer.headers.get('content-type') ?? '')
    return {
      status: answer.status,
      json: (isJson ? JSON.parse(bytes.toString()) : undefined) as T,
      bytes,
      headers: answer.headers,
    }
  }
  return {
    login,
    cookies: () => jar.header(),
    call,
    async ok<T>(method: string, path: string, body?: unknown, headers?: Record<string, string>) {
      const answer = await call<T>(method, path, body, headers)
      if (answer.status >= 300)
        throw new Error(
          `${login}: ${method} ${path} -> ${answer.status} ${answer.bytes.toString().slice(0, 400)}`,
        )
      return answer.json
    },
  }
}
