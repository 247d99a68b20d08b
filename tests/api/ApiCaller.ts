import { testPassword } from '../factories/buildPerson'

export interface ApiReply<Body = unknown> {
  status: number
  headers: Headers
  /** the body as it came */
  text: string
  /** parsed where the reply is JSON, else the text; of the type the test says the route answers */
  body: Body
}

/** Calls the API as a browser of this application would: with its cookies, and saying that the page is our own. */
export class ApiCaller {
  readonly #cookies = new Map<string, string>()
  readonly url: string

  constructor(url: string) {
    this.url = url
  }

  cookie(name: string): string | undefined {
    return this.#cookies.get(name)
  }

  setCookie(name: string, value: string): void {
    this.#cookies.set(name, value)
  }

  async call<Body = unknown>(method: string, path: string, body?: unknown, headers: Record<string, string> = {}): Promise<ApiReply<Body>> {
    const isForm = body instanceof FormData
    const response = await fetch(this.url + path, {
      method,
      redirect: 'manual',
      // A reply that never ends is a failure of its own, told at once.
      signal: AbortSignal.timeout(60_000),
      headers: {
        origin: this.url,
        cookie: [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; '),
        ...(body !== undefined && !isForm && { 'content-type': 'application/json' }),
        ...headers,
      },
      body: body === undefined ? undefined : isForm || typeof body === 'string' || body instanceof Uint8Array ? body as BodyInit : JSON.stringify(body),
    })
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? []
      if (name === undefined) continue
      if (value === '' || /max-age=0/i.test(line)) this.#cookies.delete(name)
      else this.#cookies.set(name, value as string)
    }
    const text = await response.text()
    const isJson = (response.headers.get('content-type') ?? '').startsWith('application/json')
    return { status: response.status, headers: response.headers, text, body: (isJson && text !== '' ? JSON.parse(text) : text) as Body }
  }

  get = <Body = unknown>(path: string, headers?: Record<string, string>) => this.call<Body>('GET', path, undefined, headers)
  post = <Body = unknown>(path: string, body?: unknown, headers?: Record<string, string>) => this.call<Body>('POST', path, body, headers)
  put = <Body = unknown>(path: string, body?: unknown) => this.call<Body>('PUT', path, body)
  patch = <Body = unknown>(path: string, body?: unknown) => this.call<Body>('PATCH', path, body)
  delete = <Body = unknown>(path: string) => this.call<Body>('DELETE', path)

  /** Sends text as a file, in the field `file`. */
  upload<Body = unknown>(path: string, text: string, name = 'sweep.csv'): Promise<ApiReply<Body>> {
    const form = new FormData()
    form.append('file', new Blob([text]), name)
    return this.post<Body>(path, form)
  }

  async signIn(email: string, password = testPassword): Promise<void> {
    const { status, body } = await this.post('/api/auth/sign-in', { email, password })
    if (status !== 200) throw new Error(`${email} could not sign in: ${JSON.stringify(body)}`)
  }
}
