import { getRequestHeader, type H3Event } from 'h3'
import { DomainError } from '#shared/errors'
import { checkTable } from '#shared/heat-capacity/check-table'
import { decodeTable } from '#shared/heat-capacity/decode-table'
import { readTable } from '#shared/heat-capacity/read-table'
import { heatCapacityCheckSchema } from '#shared/schemas/heat-capacity'
import { readFacility } from '#server/services/facility/queries'
import { BODY_LIMIT, readLimitedBody } from '#server/utils/body'
import { defineApi } from '#server/utils/define-api'
import { readUpload } from '#server/utils/multipart'

/**
 * Fits and checks a table and stores nothing; answers what the command line prints. Takes JSON (`table.text`, `sample`, …), or a
 * form with the file `table`, perhaps the file `addenda`, and the rest as JSON in the field `request`.
 */
export default defineApi({ access: 'heat-capacity:check', on: 'facility' }, async ({ event, db }) => {
  const { table, addenda, sample, model, restoredRows } = heatCapacityCheckSchema.parse(await readRequest(event))
  const { checkThresholds } = await readFacility(db)
  return checkTable({
    table: { table: readTable(table.text), mapping: table.mapping },
    addenda: addenda && { table: readTable(addenda.text), mapping: addenda.mapping },
    sample, terms: model?.terms, windowK: model?.windowK, restoredRows, thresholds: checkThresholds,
  })
})

async function readRequest(event: H3Event): Promise<unknown> {
  const contentType = getRequestHeader(event, 'content-type') ?? ''
  if (contentType.startsWith('application/json')) return parseJson((await readLimitedBody(event, BODY_LIMIT.upload)).toString('utf8'))
  const { files, fields } = await readUpload(event)
  const request = parseJson(fields.request ?? '{}') as { table?: object, addenda?: object }
  if (!files.table) throw new DomainError('invalid', 'Send the table as the file "table".', ['table'])
  return {
    ...request,
    table: { ...request.table, text: decodeTable(files.table.content) },
    ...(files.addenda ? { addenda: { ...request.addenda, text: decodeTable(files.addenda.content) } } : {}),
  }
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text)
  }
  catch {
    throw new DomainError('invalid', 'The request is not valid JSON. Check it and send it again.')
  }
}
