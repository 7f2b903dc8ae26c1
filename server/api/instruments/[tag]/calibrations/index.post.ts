import { instrumentParams, newCalibration } from '../../../../../shared/schemas/instrument'
import { addCalibration } from '../../../../services/calibrations'
import { defineRoute } from '../../../../utils/route'

export default defineRoute({ may: 'instrument.write', summary: 'Enter a calibration certificate of an instrument', params: instrumentParams, body: newCalibration, status: 201 },
  ({ db, person, params, body }) => addCalibration(db, person, { ...body, tag: params.tag }))
