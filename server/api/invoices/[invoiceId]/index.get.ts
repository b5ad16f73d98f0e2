import { invoiceParams } from '#shared/schemas/invoice'
import { readInvoice } from '#server/services/invoices/queries'
import { defineApi } from '#server/utils/define-api'

/** One invoice. */
export default defineApi({ access: 'invoice:read', params: invoiceParams }, ({ db, actor, params }) => readInvoice(db, { invoiceId: params.invoiceId, actor }))
