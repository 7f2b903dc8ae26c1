import { z } from 'zod'
import { optionalLine, versionSeen } from './common'

/** As typed ("10", "1.5 m"), read by how the type is counted; empty: it is not watched any more. */
export const partMinimum = z.object({ minimum: optionalLine('the minimum', 40), version: versionSeen })
export type PartMinimum = z.output<typeof partMinimum>

/** Words to find types of part by. */
export const partTypesQuery = z.object({ q: optionalLine('the words', 200) })
export type PartTypesQuery = z.output<typeof partTypesQuery>
