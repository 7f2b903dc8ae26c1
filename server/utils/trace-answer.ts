import type { H3Event } from 'h3'
import { getHeader, getRequestURL, setResponseHeader } from 'h3'
import type { ProvDocument } from '../../shared/domain/trace-prov'
import { traceToProv } from '../../shared/domain/trace-prov'
import type { TraceView } from '../../shared/types/trace'

/** A trace as it was asked for: PROV-O as JSON-LD for `Accept: application/ld+json`, else as the pages read it. */
export function answerTrace(event: H3Event, view: TraceView): TraceView | ProvDocument {
  setResponseHeader(event, 'vary', 'accept')
  if (!(getHeader(event, 'accept') ?? '').includes('application/ld+json')) return view
  setResponseHeader(event, 'content-type', 'application/ld+json; charset=utf-8')
  return traceToProv(view, getRequestURL(event).origin)
}
