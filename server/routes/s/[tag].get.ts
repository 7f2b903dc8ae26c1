import { defineEventHandler, getRouterParam, sendRedirect, setResponseHeader } from 'h3'
import { findLabelTarget } from '../../services/label-address'
import { useDb } from '../../utils/db'
import { findProof } from '../../utils/person'

/** What a label's QR code holds. Also answers at `/S/…`, the form in capitals that makes the code smaller. */
export default defineEventHandler(async (event) => {
  const proof = await findProof(event)
  setResponseHeader(event, 'cache-control', 'no-store')
  return sendRedirect(event, await findLabelTarget(useDb(), proof !== null, getRouterParam(event, 'tag', { decode: true }) ?? ''))
})
