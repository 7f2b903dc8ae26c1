/**
 * The trace in the terms of W3C PROV-O (https://www.w3.org/TR/prov-o/): lots and units are entities, suppliers and buyers agents,
 * a fitting an activity that used a part. A unit after a fitting is an entity of its own, a specialisation of the unit, so that
 * nothing is ever derived from itself, as PROV-CONSTRAINTS asks, however often a part goes in and out. Only the day of a fitting is
 * known, which is less than prov:endedAtTime takes, so that it is told as dcterms:date.
 */
import type { TraceEdge, TraceKey, TraceNode, TraceView } from '../types/trace'

type Reference = { '@id': string }
type Typed = { '@type': 'xsd:date', '@value': string }
export interface ProvStatement {
  '@id': string
  '@type'?: string
  'rdfs:label'?: string
  'prov:wasDerivedFrom'?: Reference
  'prov:wasAttributedTo'?: Reference
  'prov:wasGeneratedBy'?: Reference
  'prov:specializationOf'?: Reference
  'prov:used'?: Reference[]
  'dcterms:date'?: Typed
}
export interface ProvDocument { '@context': Record<string, string>, '@graph': ProvStatement[] }

const CONTEXT = { prov: 'http://www.w3.org/ns/prov#', rdfs: 'http://www.w3.org/2000/01/rdf-schema#', xsd: 'http://www.w3.org/2001/XMLSchema#', dcterms: 'http://purl.org/dc/terms/' }

/** The document; `origin` is the shop's address ("https://shop.example"), from which things with a tag are named. */
export function traceToProv({ nodes, forwards, backwards }: TraceView, origin: string): ProvDocument {
  const named = new Map(nodes.map(node => [node.key, iriOf(node, origin)]))
  const edges = uniqueEdges([...backwards?.edges ?? [], ...forwards?.edges ?? []])
  const fittings = new Map(edges.filter(({ kind }) => kind === 'fitted').map(edge => [edge.fittingId, edge]))
  return { '@context': CONTEXT, '@graph': [...nodes.map(node => describeNode(node, origin)), ...edges.flatMap(edge => describeEdge(edge, named, fittings))] }
}

const idOf = (key: TraceKey) => key.slice(key.indexOf(':') + 1)
const iriOf = ({ tag, key }: TraceNode, origin: string) => tag === null ? `urn:uuid:${idOf(key)}` : `${origin}/s/${tag}`
const afterFitting = (unit: string, fittingId: string) => `${unit}#after-${fittingId}`

function uniqueEdges(edges: readonly TraceEdge[]): TraceEdge[] {
  return [...new Map(edges.map(edge => [`${edge.from} ${edge.to} ${edge.kind} ${edge.fittingId ?? ''} ${edge.on}`, edge])).values()]
}

function describeNode(node: TraceNode, origin: string): ProvStatement {
  const isAgent = node.kind === 'supplier' || node.kind === 'buyer'
  return { '@id': iriOf(node, origin), '@type': isAgent ? 'prov:Agent' : 'prov:Entity', 'rdfs:label': node.title }
}

function describeEdge(edge: TraceEdge, named: Map<TraceKey, string>, fittings: Map<string | null, TraceEdge>): ProvStatement[] {
  const [from, to] = [named.get(edge.from), named.get(edge.to)]
  if (from === undefined || to === undefined) return []
  switch (edge.kind) {
    case 'fitted': return edge.fittingId === null ? [] : describeFitting(edge, from, to, edge.fittingId)
    case 'supplied': return [{ '@id': to, 'prov:wasAttributedTo': { '@id': from } }]
    case 'sold': return [{ '@id': from, 'prov:wasAttributedTo': { '@id': to } }]
    case 'split': return [{ '@id': to, 'prov:wasDerivedFrom': { '@id': from } }]
    case 'pulled': return [{ '@id': to, 'prov:wasDerivedFrom': { '@id': edge.fittingId !== null && fittings.has(edge.fittingId) ? afterFitting(from, edge.fittingId) : from } }]
  }
}

function describeFitting({ on }: TraceEdge, lot: string, unit: string, fittingId: string): ProvStatement[] {
  const activity = `urn:uuid:${fittingId}`
  return [
    { '@id': activity, '@type': 'prov:Activity', 'prov:used': [{ '@id': lot }, { '@id': unit }], 'dcterms:date': { '@type': 'xsd:date', '@value': on } },
    { '@id': afterFitting(unit, fittingId), '@type': 'prov:Entity', 'prov:specializationOf': { '@id': unit }, 'prov:wasGeneratedBy': { '@id': activity }, 'prov:wasDerivedFrom': { '@id': lot } },
  ]
}
