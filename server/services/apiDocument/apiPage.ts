import type { ApiDocument, Operation, Parameter } from './openApiDocument.js'

type JsonSchema = Record<string, unknown>

/** The API document as a page to read: no script, light and dark, every route under an address of its own. */
export function apiPage(document: ApiDocument): string {
  const operations = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
  )
  const groups = document.tags.map(({ name }) => ({
    name,
    operations: operations.filter(({ operation }) => operation.tags.includes(name)),
  }))
  const schemas = Object.entries(document.components.schemas).sort(([a], [b]) => a.localeCompare(b))
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="color-scheme" content="light dark">
<title>${text(document.info.title)}</title>
<style>${STYLE}</style>
</head>
<body>
<header>
<h1>${text(document.info.title)}</h1>
<p>${text(document.info.description)}</p>
<p>Version ${text(document.info.version)}. The same as data: <a href="/api/openapi.json">/api/openapi.json</a> (OpenAPI ${document.openapi}).</p>
</header>
<nav aria-label="Groups"><ul>${groups.map(({ name }) => `<li><a href="#${anchor(name)}">${text(name)}</a></li>`).join('')}<li><a href="#schemas">Schemas</a></li></ul></nav>
<main>
${groups
  .map(
    ({ name, operations: listed }) =>
      `<section id="${anchor(name)}"><h2>${text(name)}</h2>${listed.map(operationArticle).join('\n')}</section>`,
  )
  .join('\n')}
<section id="schemas"><h2>Schemas</h2>
${schemas.map(([name, schema]) => `<article id="schema-${anchor(name)}"><h3>${text(name)}</h3>${schemaBlock(schema, `Schema ${name}`)}</article>`).join('\n')}
</section>
</main>
</body>
</html>
`
}

function operationArticle(entry: { path: string; method: string; operation: Operation }): string {
  const { path, method, operation } = entry
  const body = Object.entries(operation.requestBody?.content ?? {})[0]
  const [status, reply] = Object.entries(operation.responses).find(([code]) => code !== 'default') ?? ['200', undefined]
  const replyContent = Object.entries(reply?.content ?? {})[0]
  return `<article id="${operation.operationId}">
<h3><a href="#${operation.operationId}"><code><b>${method.toUpperCase()}</b> ${text(path)}</code></a></h3>
<p>${text(operation.summary)}. ${text(operation.description)}</p>
${parameterTable(operation)}
${body ? `<h4>Sent, ${text(body[0])}</h4>${schemaBlock(body[1].schema, `What ${operation.operationId} takes`)}` : ''}
<h4>Reply ${status}${replyContent ? `, ${text(replyContent[0])}` : ''}</h4>
${replyContent ? schemaBlock(replyContent[1].schema, `What ${operation.operationId} gives`) : ''}
</article>`
}

function parameterTable({ parameters, operationId }: Operation): string {
  if (parameters.length === 0) return ''
  const row = (one: Parameter) =>
    `<tr><th scope="row"><code>${text(one.name)}</code></th><td>${one.in}</td><td>${one.required ? 'needed' : 'optional'}</td><td>${typeName(one.schema)}${one.description ? `, ${text(one.description)}` : ''}</td></tr>`
  return `<div class="scrolls" tabindex="0" role="region" aria-label="Parameters of ${operationId}"><table><thead><tr><th scope="col">Parameter</th><th scope="col">In</th><th scope="col">Needed</th><th scope="col">What</th></tr></thead><tbody>${parameters.map(row).join('')}</tbody></table></div>`
}

function schemaBlock(schema: JsonSchema, label: string): string {
  return `<pre tabindex="0" role="region" aria-label="${text(label)}">${shape(schema, '')}</pre>`
}

/** A schema in the notation of a type, with links to the schemas it names. */
function shape(schema: JsonSchema, indent: string): string {
  const properties = schema['properties'] as Record<string, JsonSchema> | undefined
  if (properties) {
    const required = (schema['required'] as string[] | undefined) ?? []
    const inner = `${indent}  `
    const lines = Object.entries(properties).map(([name, one]) => {
      const note = one['description'] ? `  <i>${text(one['description'])}</i>` : ''
      return `${inner}${text(name)}${required.includes(name) ? '' : '?'}: ${shape(one, inner)}${note}`
    })
    return lines.length > 0 ? `{\n${lines.join('\n')}\n${indent}}` : '{}'
  }
  if (schema['items']) return `${shape(schema['items'] as JsonSchema, indent)}[]`
  const choices = (schema['anyOf'] ?? schema['oneOf']) as JsonSchema[] | undefined
  if (choices) return choices.map((one) => shape(one, indent)).join(' | ')
  return typeName(schema)
}

function typeName(schema: JsonSchema): string {
  if (typeof schema['$ref'] === 'string') {
    const name = schema['$ref'].split('/').at(-1) ?? ''
    return `<a href="#schema-${anchor(name)}">${text(name)}</a>`
  }
  if (Array.isArray(schema['enum'])) return schema['enum'].map((one) => text(JSON.stringify(one))).join(' | ')
  if ('const' in schema) return text(JSON.stringify(schema['const']))
  if (schema['items']) return `${typeName(schema['items'] as JsonSchema)}[]`
  const type = Array.isArray(schema['type']) ? schema['type'].join(' | ') : schema['type']
  const format = typeof schema['format'] === 'string' ? ` (${schema['format']})` : ''
  return text(`${typeof type === 'string' ? type : 'anything'}${format}${rangeOf(schema)}`)
}

function rangeOf(schema: JsonSchema): string {
  const said = BOUNDS.flatMap(([key, before, after]) => {
    const bound = schema[key]
    if (typeof bound !== 'number' || Math.abs(bound) >= Number.MAX_SAFE_INTEGER) return []
    return [`${before} ${bound}${after}`]
  })
  return said.length > 0 ? `, ${said.join(', ')}` : ''
}

const BOUNDS = [
  ['minimum', 'from', ''],
  ['exclusiveMinimum', 'above', ''],
  ['maximum', 'to', ''],
  ['exclusiveMaximum', 'below', ''],
  ['minLength', 'at least', ' characters'],
  ['maxLength', 'at most', ' characters'],
] as const

const anchor = (name: string) => name.toLowerCase().replaceAll(/[^a-z0-9]+/g, '-')

function text(value: unknown): string {
  return String(value)
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
}

const STYLE = `
:root { --paper: #faf8f3; --ink: #1d2330; --quiet: #535b69; --line: #d9d4c7; --link: #1f4f8f; --sheet: #f1eee5 }
@media (prefers-color-scheme: dark) {
  :root { --paper: #10151f; --ink: #e6e8ec; --quiet: #a9b1bf; --line: #2c3444; --link: #9cc3f5; --sheet: #182030 }
}
* { box-sizing: border-box }
body { margin: 0 auto; max-width: 68rem; padding: 2rem 1.25rem 6rem; background: var(--paper); color: var(--ink); font: 1rem/1.55 'Source Sans 3', system-ui, sans-serif }
h1 { font-size: 1.8rem } h2 { margin-top: 3rem; border-bottom: 1px solid var(--line); font-size: 1.35rem }
h3 { margin: 2rem 0 .25rem; font-size: 1rem } h4 { margin: 1rem 0 .25rem; color: var(--quiet); font-size: .9rem }
h3 a { color: inherit; text-decoration: none } h3 a:hover { text-decoration: underline }
a { color: var(--link) } nav ul { display: flex; flex-wrap: wrap; gap: .35rem 1.25rem; padding: 0; list-style: none }
code, pre { font-family: 'Roboto Mono', ui-monospace, monospace; font-size: .85rem }
pre { overflow-x: auto; margin: 0; padding: .75rem 1rem; background: var(--sheet); line-height: 1.5 }
pre i { color: var(--quiet) } .scrolls { overflow-x: auto } table { border-collapse: collapse; font-size: .9rem }
th, td { padding: .2rem 1rem .2rem 0; text-align: left; vertical-align: top }
article:target { outline: 2px solid var(--link); outline-offset: .5rem }
`
