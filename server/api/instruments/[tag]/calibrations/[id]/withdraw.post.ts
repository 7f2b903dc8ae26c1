import { calibrationParams, withdrawnCalibration } from '../../../../../../shared/schemas/instrument'
import { withdrawCalibration } from '../../../../../services/calibrations'
import { defineRoute } from '../../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'Take a certificate back, and say why', params: calibrationParams, body: withdrawnCalibration },
  ({ db, person, params, body }) => withdrawCalibration(db, person, { ...params, why: body.why }))
