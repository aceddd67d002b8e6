import { z } from 'zod'
import { errorStatus } from '../../shared/errors'
import { permissions } from '../../shared/permissions'
import { errorReply } from '../../shared/schemas/common'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Endpoint } from '../../shared/schemas/endpoint'
import type { Context } from '../context'
import { softwareVersion } from '../software-version'

type Json = Record<string, unknown>

/** The description of the interface (OpenAPI 3.1), made from the table the server itself follows. */
export function openApiDocument(context: Context): Json {
  const paths: Record<string, Json> = {}
  for (const [name, endpoint] of Object.entries(endpoints) as [string, Endpoint][]) {
    const path = endpoint.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [endpoint.method.toLowerCase()]: operation(name, endpoint) }
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Offing', version: softwareVersion, description: 'Sign in by cookie, or send a personal token.' },
    servers: [{ url: `${context.env.baseUrl}/api` }],
    paths,
    components: {
      schemas: { Error: toSchema(errorReply, 'output') },
      securitySchemes: {
        personalToken: { type: 'http', scheme: 'bearer', description: 'A personal token, made under Account.' },
        session: { type: 'apiKey', in: 'cookie', name: 'offing_session' },
      },
    },
  }
}

function operation(name: string, endpoint: Endpoint): Json {
  const tag = endpoint.path.split('/')[1]?.replace(/\..*$/, '') ?? ''
  return {
    operationId: name,
    summary: endpoint.summary,
    tags: [tag],
    security: endpoint.may === 'anyone' ? [] : [{ session: [] }, { personalToken: [] }],
    ...(endpoint.may === 'anyone' ? {} : { description: `For: ${permissions[endpoint.may].join(', ')}.` }),
    parameters: [...parameters(endpoint.params, 'path'), ...parameters(endpoint.query, 'query')],
    ...requestBody(endpoint),
    responses: { [String(endpoint.status ?? 200)]: success(endpoint), ...errors(endpoint) },
  }
}

function parameters(schema: z.ZodType | undefined, place: 'path' | 'query'): Json[] {
  if (!schema) return []
  const { properties = {}, required = [] } = toSchema(schema, 'input') as { properties?: Record<string, Json>; required?: string[] }
  return Object.entries(properties).map(([name, property]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema: property,
  }))
}

function requestBody(endpoint: Endpoint): Json {
  if (endpoint.multipart) return { requestBody: { required: true, content: { 'multipart/form-data': { schema: multipartSchema } } } }
  if (!endpoint.body) return {}
  return { requestBody: { required: true, content: { 'application/json': { schema: toSchema(endpoint.body, 'input') } } } }
}

const multipartSchema: Json = {
  type: 'object',
  description: 'Fields come before the files.',
  properties: {
    feedId: { type: 'integer' },
    observedAt: { type: 'string', format: 'date-time', description: 'Used only if the file has no time.' },
    file: { type: 'array', items: { type: 'string', format: 'binary' } },
  },
  required: ['file'],
}

function success(endpoint: Endpoint): Json {
  const type = endpoint.contentType ?? 'application/json'
  if (endpoint.reply) return { description: 'Done', content: { [type]: { schema: toSchema(endpoint.reply, 'output') } } }
  return endpoint.contentType ? { description: 'Done', content: { [type]: { schema: { type: 'string' } } } } : { description: 'Done' }
}

function errors(endpoint: Endpoint): Json {
  const codes: (keyof typeof errorStatus)[] = ['server-error']
  if (endpoint.may !== 'anyone') codes.unshift('not-signed-in', 'not-allowed')
  if (endpoint.params) codes.push('not-found')
  if (endpoint.params ?? endpoint.query ?? endpoint.body) codes.push('not-valid')
  const content = { 'application/json': { schema: { $ref: '#/components/schemas/Error' } } }
  return Object.fromEntries(codes.map((code) => [String(errorStatus[code]), { description: code, content }]))
}

function toSchema(schema: z.ZodType, io: 'input' | 'output'): Json {
  const { $schema: _, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any', reused: 'inline' }) as Json
  return rest
}
