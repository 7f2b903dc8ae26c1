import { z } from 'zod'
import { TRACE_DIRECTIONS } from '../types/trace'

export const traceQuery = z.object({ direction: z.enum(['both', ...TRACE_DIRECTIONS], { error: 'The direction is forwards, backwards or both' }).default('both') })
