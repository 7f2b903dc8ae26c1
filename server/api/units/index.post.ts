import { newUnit } from '../../../shared/schemas/unit'
import { bookInUnit } from '../../services/intake'
import { defineRoute } from '../../utils/route'

export default defineRoute({ may: 'unit.book-in', summary: 'Book a piece in: it gets its tag at once', body: newUnit, status: 201 },
  ({ db, person, body }) => bookInUnit(db, person, body))
