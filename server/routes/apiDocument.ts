import { Router } from 'express'
import { apiPage } from '../services/apiDocument/apiPage.js'
import { openApiDocument } from '../services/apiDocument/openApiDocument.js'
import { PRODUCT_VERSION } from '../version.js'

/** The contract as an OpenAPI document and as a page to read. */
export function apiDocumentRouter(): Router {
  const router = Router()
  const document = openApiDocument(PRODUCT_VERSION)
  const page = apiPage(document)
  router.get('/api/openapi.json', (_request, response) => {
    response.json(document)
  })
  router.get('/api', (_request, response) => {
    response.type('html').send(page)
  })
  return router
}
