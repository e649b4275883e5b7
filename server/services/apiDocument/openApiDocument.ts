import { z } from 'zod'
import { Problem } from '../../../shared/contract/errors.js'
import { RIGHTS } from '../../../shared/contract/rights.js'
import type { Access, Route } from '../../../shared/contract/route.js'
import { ROUTES } from '../../../shared/contract/routes.js'

type JsonSchema = Record<string, unknown>
type Content = Record<string, { schema: JsonSchema }>
export interface Parameter {
  name: string
  in: 'path' | 'query'
  required: boolean
  description?: string
  schema: JsonSchema
}
export interface Operation {
  operationId: string
  tags: string[]
  summary: string
  description: string
  parameters: Parameter[]
  requestBody?: { required: true; content: Content }
  responses: Record<string, { description: string; content?: Content }>
  security: Record<string, string[]>[]
}
export interface ApiDocument {
  openapi: '3.1.0'
  info: { title: string; version: string; description: string }
  tags: { name: string }[]
  paths: Record<string, Record<string, Operation>>
  components: { schemas: Record<string, JsonSchema>; securitySchemes: Record<string, JsonSchema> }
}

const DESCRIPTION = `Units stand in the names of fields. Times are ISO 8601 in UTC. Lists page by an opaque cursor and say the total.
Every change needs the header X-CSRF-Token with the token of GET /api/session. Errors are problem documents (RFC 9457).`

/** The OpenAPI 3.1 document of the contract: every route, and every schema that carries an id as a component. */
export function openApiDocument(version: string, routes: readonly Route[] = ROUTES): ApiDocument {
  const components = new Components()
  const problem = components.replySchema(Problem)
  for (const route of routes) components.replySchema(route.reply)
  const paths: ApiDocument['paths'] = {}
  for (const route of routes) {
    const path = route.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [route.method]: operationOf(route, components, problem) }
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Tierlight API', version, description: DESCRIPTION },
    tags: [...new Set(routes.map((route) => route.group))].map((name) => ({ name })),
    paths,
    components: {
      schemas: components.schemas,
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'tierlight.session' } },
    },
  }
}

function operationOf(route: Route, components: Components, problem: JsonSchema): Operation {
  const body = requestBodyOf(route, components)
  const reply: Content =
    route.transfer === 'bytes'
      ? { 'application/octet-stream': { schema: { type: 'string', format: 'binary' } } }
      : { 'application/json': { schema: components.replySchema(route.reply) } }
  return {
    operationId: route.id,
    tags: [route.group],
    summary: route.summary,
    description: accessSentence(route.access),
    parameters: [...parametersOf(route.params, 'path', components), ...parametersOf(route.query, 'query', components)],
    ...(body ? { requestBody: body } : {}),
    responses: {
      [String(route.status ?? 200)]: { description: 'Done', content: reply },
      default: { description: 'A problem', content: { 'application/problem+json': { schema: problem } } },
    },
    security: route.access === 'public' ? [] : [{ session: [] }],
  }
}

function requestBodyOf(route: Route, components: Components): Operation['requestBody'] {
  if (route.transfer === 'files') {
    const files = { type: 'array', items: { type: 'string', format: 'binary' } }
    const schema = { type: 'object', properties: { files }, required: ['files'] }
    return { required: true, content: { 'multipart/form-data': { schema } } }
  }
  if (!route.body) return undefined
  return { required: true, content: { 'application/json': { schema: components.requestSchema(route.body) } } }
}

function parametersOf(schema: z.ZodType | undefined, place: Parameter['in'], components: Components): Parameter[] {
  if (!schema) return []
  const { properties = {}, required = [] } = components.requestSchema(schema) as {
    properties?: Record<string, JsonSchema>
    required?: string[]
  }
  return Object.entries(properties).map(([name, { description, ...rest }]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    ...(typeof description === 'string' ? { description } : {}),
    schema: rest,
  }))
}

/** Who may call a route, as a sentence. */
export function accessSentence(access: Access): string {
  if (access === 'public') return 'Anyone may call it.'
  if (access === 'signed-in') return 'Anyone who is signed in may call it.'
  if (access === 'administrator') return 'Administrators of the site may call it.'
  return `Members of the project with one of these roles may call it: ${RIGHTS[access.right].join(', ')}.`
}

/** Collects the named schemas. A schema that is read otherwise than it is sent gets a second name for what is sent. */
class Components {
  readonly schemas: Record<string, JsonSchema> = {}

  replySchema(schema: z.ZodType): JsonSchema {
    return this.convert(schema, 'output')
  }

  requestSchema(schema: z.ZodType): JsonSchema {
    return this.convert(schema, 'input')
  }

  private convert(schema: z.ZodType, io: 'input' | 'output'): JsonSchema {
    const wrapped = z.toJSONSchema(z.object({ root: schema }), { io, unrepresentable: 'any' })
    const named = (wrapped.$defs ?? {}) as Record<string, JsonSchema>
    const names = io === 'output' ? {} : this.namesOfSent(named)
    const place = (value: unknown) => withReferences(value, names) as JsonSchema
    for (const [name, one] of Object.entries(named)) this.schemas[names[name] ?? name] = place(one)
    return place(wrapped.properties?.['root'])
  }

  /** New names for what differs from its form in replies, itself or in what it refers to. */
  private namesOfSent(sent: Record<string, JsonSchema>): Record<string, string> {
    const names: Record<string, string> = {}
    const differs = (name: string) => {
      const known = this.schemas[name]
      return known !== undefined && JSON.stringify(known) !== JSON.stringify(withReferences(sent[name], names))
    }
    for (let settled = false; !settled;) {
      const next = Object.keys(sent).find((name) => !(name in names) && differs(name))
      if (next === undefined) settled = true
      else names[next] = `${next}Sent`
    }
    return names
  }
}

/** Turns the local references of one converted schema into references to components. */
function withReferences(value: unknown, names: Record<string, string>): unknown {
  if (Array.isArray(value)) return value.map((one) => withReferences(one, names))
  if (typeof value !== 'object' || value === null) return value
  return Object.fromEntries(
    Object.entries(value).map(([key, one]) => {
      if (key !== '$ref' || typeof one !== 'string') return [key, withReferences(one, names)]
      const name = one.replace('#/$defs/', '')
      return [key, `#/components/schemas/${names[name] ?? name}`]
    }),
  )
}
