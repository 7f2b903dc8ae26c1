import { getRequestURL } from 'h3'
import { labelQuery } from '../../../shared/schemas/labels'
import { viewLabelSheet } from '../../services/labels'
import { readBaseUrl } from '../../utils/config'
import { labelBase } from '../../utils/label-codes'
import { defineRoute } from '../../utils/route'

export default defineRoute({
  may: 'label.print', summary: 'The first sheet of a run of labels, as it will print', query: labelQuery,
}, async ({ event, db, query }) => viewLabelSheet(db, query, labelBase(readBaseUrl(event), getRequestURL(event).origin)))
