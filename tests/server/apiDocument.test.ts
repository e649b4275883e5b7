import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { z } from 'zod'
import { defineRoute } from '../../shared/contract/route.js'
import { ROUTES } from '../../shared/contract/routes.js'
import { openApiDocument, type ApiDocument } from '../../server/services/apiDocument/openApiDocument.js'
import { startApplication, type Application } from '../support/application.js'

let application: Application
let document: ApiDocument
beforeAll(async () => {
  application = await startApplication()
  document = (await application.as('signed-out').get('/api/openapi.json').expect(200)).body as ApiDocument
})
afterAll(() => application?.stop())

const operations = () => Object.values(document.paths).flatMap((methods) => Object.values(methods))

/** Every reference in a part of the document. */
function references(value: unknown): string[] {
  if (Array.isArray(value)) return value.flatMap(references)
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, one]) => (key === '$ref' ? [String(one)] : references(one)))
}

describe('the OpenAPI document', () => {
  test('has every route of the contract, once', () => {
    expect(document.openapi).toBe('3.1.0')
    expect(
      operations()
        .map(({ operationId }) => operationId)
        .sort(),
    ).toEqual(ROUTES.map(({ id }) => id).sort())
    for (const { method, path, status } of ROUTES) {
      const operation = document.paths[path.replace(/:(\w+)/g, '{$1}')]?.[method]
      expect(Object.keys(operation?.responses ?? {})).toEqual([String(status ?? 200), 'default'])
    }
  })

  test('names every parameter of a path', () => {
    for (const [path, methods] of Object.entries(document.paths)) {
      const inPath = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name)
      for (const { parameters } of Object.values(methods))
        expect(parameters.filter((one) => one.in === 'path').map(({ name }) => name)).toEqual(inPath)
    }
  })

  test('refers only to schemas that it has', () => {
    const named = references(document)
    expect(named.length).toBeGreaterThan(50)
    for (const reference of named)
      expect(document.components.schemas).toHaveProperty([reference.replace('#/components/schemas/', '')])
  })

  test('shows what is sent apart from what is read where a default makes them differ', () => {
    const Settings = z.object({ points: z.int().default(3) }).meta({ id: 'Settings' })
    const Holder = z.object({ settings: Settings }).meta({ id: 'Holder' })
    const route = defineRoute({
      id: 'save',
      method: 'put',
      path: '/api/things/:thingId',
      group: 'Things',
      summary: 'Save',
      access: 'signed-in',
      params: z.object({ thingId: z.uuid() }),
      body: Holder,
      reply: Holder,
    })
    const { components, paths } = openApiDocument('1.0.0', [route])
    const operation = paths['/api/things/{thingId}']?.['put']
    expect(operation?.requestBody?.content['application/json']?.schema).toEqual({
      $ref: '#/components/schemas/HolderSent',
    })
    expect(components.schemas['HolderSent']).toMatchObject({
      properties: { settings: { $ref: '#/components/schemas/SettingsSent' } },
    })
    expect(components.schemas['SettingsSent']).not.toHaveProperty('required')
    expect(components.schemas['Settings']).toHaveProperty('required', ['points'])
  })

  test('says who may call a route', () => {
    const upload = operations().find(({ operationId }) => operationId === 'uploadFiles')
    expect(upload?.description).toBe(
      'Members of the project with one of these roles may call it: lead, experimentalist.',
    )
    expect(upload?.requestBody?.content).toHaveProperty(['multipart/form-data'])
    expect(upload?.security).toEqual([{ session: [] }])
  })
})

describe('the page of the API', () => {
  test('shows every route and every schema, and every link on it leads somewhere', async () => {
    const reply = await application.as('signed-out').get('/api').expect(200)
    expect(reply.type).toBe('text/html')
    const ids = new Set([...reply.text.matchAll(/ id="([^"]+)"/g)].map(([, id]) => id))
    for (const { id } of ROUTES) expect(ids).toContain(id)
    for (const name of Object.keys(document.components.schemas)) expect(ids).toContain(`schema-${name.toLowerCase()}`)
    const links = [...reply.text.matchAll(/href="#([^"]+)"/g)].map(([, id]) => id)
    expect(links.length).toBeGreaterThan(100)
    for (const link of links) expect(ids).toContain(link)
    expect(reply.text).not.toMatch(/<script/)
  })
})
