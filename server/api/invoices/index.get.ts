import { listInvoices } from '#server/services/invoices/queries'
import { defineApi } from '#server/utils/define-api'

/** Invoices the actor may see. */
export default defineApi({ access: 'invoice:read' }, ({ db, actor }) => listInvoices(db, { actor }))
