import { saveProcedure } from '../../server/services/procedures'
import { getModel } from '../../server/services/models'
import type { Database } from '../../server/utils/db'
import type { SuggestionOptions } from '../../shared/domain/procedure-suggestions'
import { suggestCheckpoints } from '../../shared/domain/procedure-suggestions'
import type { Person } from '../../shared/types/person'

interface DemoProcedure { model: string, origin: string, warmUpMinutes: number, dialPoints: number, groups: SuggestionOptions['groups'] }

/** Three models whose procedure goes beyond the dial, which is judged by each model's own tolerance. */
const PROCEDURES: readonly DemoProcedure[] = [
  {
    model: '307-G', origin: 'Handbook of the type, performance table', warmUpMinutes: 30, dialPoints: 3,
    groups: {
      dial: { list: '', limit: null },
      output_level: { list: '', limit: 2 },
      attenuator: { list: '20 dB × 4', limit: 2 },
      modulation: { list: '30 %', limit: 15 },
      modulation_tone: { list: '400 Hz', limit: 10 },
      rail: { list: 'HT 250 V, heaters 6.3 V', limit: 5 },
    },
  },
  {
    model: 'AO-12', origin: 'Maker’s leaflet', warmUpMinutes: 20, dialPoints: 5,
    groups: { dial: { list: '', limit: null }, output_level: { list: '', limit: 1 }, rail: { list: 'HT 280 V', limit: 10 } },
  },
  {
    model: 'VV-6', origin: 'Handbook, calibration section', warmUpMinutes: 15, dialPoints: 3,
    groups: { meter: { list: '1.5, 5, 15, 50, 150 V', limit: 3 }, resistance: { list: '10 ohm, 1 k, 100 k, 1 M', limit: 5 }, rail: { list: 'HT 150 V', limit: 10 } },
  },
]

/** Gives three demo models their procedure, through the same service as the page. `modelIds`: by the model's key. */
export async function addProcedures(db: Database, bench: Person, modelIds: ReadonlyMap<string, string>): Promise<void> {
  for (const { model, groups, dialPoints, ...said } of PROCEDURES) {
    const modelId = modelIds.get(model)
    if (!modelId) throw new Error(`The demo has no model ${model}`)
    const { checkpoints, problems } = suggestCheckpoints(await getModel(db, modelId), { groups, dialPoints })
    if (problems.length > 0) throw new Error(problems.join(' '))
    await saveProcedure(db, bench, { modelId, seen: 0, why: '', supply: '240 V 50 Hz', decisionRule: 'guard_band', guardFactor: 1, checkpoints, ...said })
  }
}
