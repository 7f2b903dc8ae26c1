import { z } from 'zod'
import { routes } from '#route-index'
import type { AnyRouteDefinition } from '../utils/route'
import { defineRoute } from '../utils/route'

const problem = { description: 'Refused', content: { 'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } } } }

/** A zod schema as JSON Schema; what a transform cannot describe is left open. */
const jsonSchema = (schema: z.ZodType) => z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' })

function parameters(definition: AnyRouteDefinition) {
  const list = (schema: z.ZodType | undefined, place: 'path' | 'query') => {
    if (!schema) return []
    const { properties = {}, required = [] } = jsonSchema(schema)
    return Object.entries(properties).map(([name, described]) => ({
      name, in: place, required: place === 'path' || required.includes(name), schema: described,
    }))
  }
  return [...list(definition.params, 'path'), ...list(definition.query, 'query')]
}

function operation(definition: AnyRouteDefinition) {
  const refusals = definition.may === 'anyone' ? ['400', '404'] : ['400', '401', '403', '404']
  if (definition.body) refusals.push('409', '413', '415', '422')
  return {
    'summary': definition.summary,
    'x-may': definition.may,
    'security': definition.may === 'anyone' ? [] : [{ token: [] }],
    'parameters': parameters(definition),
    ...(definition.body && { requestBody: { required: true, content: { 'application/json': { schema: jsonSchema(definition.body) } } } }),
    ...(definition.takes && { requestBody: { required: true, content: { [definition.takes]: { schema: { type: 'object' } } } } }),
    'responses': {
      [definition.status ?? 200]: { description: 'Done', content: { [definition.answers ?? 'application/json']: {} } },
      ...Object.fromEntries(refusals.map(status => [status, problem])),
    },
  }
}

export default defineRoute({ may: 'anyone', summary: 'This description' }, async () => {
  const paths: Record<string, Record<string, object>> = {}
  for (const route of routes) {
    const { default: handler } = await route.load()
    const address = paths[route.path] ??= {}
    address[route.method] = operation(handler.definition)
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Knurl', version: '1', description: 'The same routes that serve the pages. Send a personal access token as Authorization: Bearer.' },
    paths,
    components: {
      securitySchemes: { token: { type: 'http', scheme: 'bearer' } },
      schemas: {
        Problem: {
          type: 'object', required: ['title', 'status', 'detail', 'code'],
          properties: {
            title: { type: 'string' }, status: { type: 'integer' }, detail: { type: 'string' }, code: { type: 'string' },
            errors: { type: 'array', items: { type: 'object', properties: { path: { type: 'string' }, message: { type: 'string' } } } },
          },
        },
      },
    },
  }
})
