import { errorReply } from '../../shared/schemas/common'
import type { BodyInputOf, Endpoint, QueryInputOf, ReplyOf } from '../../shared/schemas/endpoint'
import { endpoints } from '../../shared/schemas/endpoints'
import { receipt } from '../../shared/schemas/files'

interface Given<E extends Endpoint> {
  params?: Record<string, string | number>
  query?: QueryInputOf<E>
  body?: BodyInputOf<E>
}

export interface JourneyApi {
  /** Any call of the table; the reply is read with its schema, a refusal is thrown with its code and sentence. */
  call<E extends Endpoint>(endpoint: E, given?: Given<E>): Promise<ReplyOf<E>>
  /** Sends one file as a program would; answers its receipt. */
  send(name: string, bytes: Uint8Array<ArrayBuffer>, fields?: Record<string, string>): Promise<{ id: number; name: string; checksum: string; status: string }>
}

/** The HTTP interface as an outside program uses it, with a personal token. */
export function apiWith(baseUrl: string, token: string): JourneyApi {
  const headers = { authorization: `Bearer ${token}` }
  return {
    call: async (endpoint, { params = {}, query, body } = {}) => {
      const reply = await fetch(addressOf(baseUrl, endpoint, params, query), {
        method: endpoint.method,
        headers: body === undefined ? headers : { ...headers, 'content-type': 'application/json' },
        ...(body === undefined ? {} : { body: JSON.stringify(body) }),
      })
      return (await readReply(endpoint, reply)) as ReplyOf<typeof endpoint>
    },
    send: async (name, bytes, fields = {}) => {
      const form = new FormData()
      for (const [field, value] of Object.entries(fields)) form.set(field, value)
      form.set('file', new Blob([bytes]), name)
      const reply = await fetch(`${baseUrl}/api/files`, { method: 'POST', headers, body: form })
      const { items } = (await readReply(endpoints.uploadFiles, reply)) as ReplyOf<typeof endpoints.uploadFiles>
      return receipt.parse(items[0])
    },
  }
}

/** Signs in with a password and makes a token. */
export async function apiOf(baseUrl: string, credentials: { email: string; password: string }): Promise<JourneyApi> {
  const post = (path: string, body: unknown, cookie = '') =>
    fetch(`${baseUrl}/api${path}`, { method: 'POST', headers: { 'content-type': 'application/json', cookie }, body: JSON.stringify(body) })
  const signedIn = await post('/auth/sign-in', credentials)
  await readReply(endpoints.signIn, signedIn)
  const cookie = signedIn.headers.getSetCookie().map((one) => one.split(';')[0]).join('; ')
  const made = await post('/tokens', { name: 'journey' }, cookie)
  const { token } = (await readReply(endpoints.createToken, made)) as ReplyOf<typeof endpoints.createToken>
  return apiWith(baseUrl, token)
}

function addressOf(baseUrl: string, endpoint: Endpoint, params: Record<string, string | number>, query: unknown): string {
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(String(params[name])))
  const asked = Object.entries(query ?? {}).filter(([, value]) => value !== undefined)
  return `${baseUrl}/api${path}?${new URLSearchParams(asked.map(([name, value]) => [name, String(value)]))}`
}

async function readReply(endpoint: Endpoint, reply: Response): Promise<unknown> {
  const text = await reply.text()
  if (!reply.ok) {
    const { code, message } = errorReply.parse(JSON.parse(text)).error
    throw new Error(`${endpoint.method} ${endpoint.path} was refused (${reply.status}, ${code}): ${message}`)
  }
  return endpoint.reply?.parse(JSON.parse(text))
}
