import { runParams } from '#shared/schemas/run'
import { startDeposit } from '#server/services/payments/start-deposit'
import { defineApi } from '#server/utils/define-api'
import { usePayments } from '#server/utils/services'

/** Begins paying a deposit; the reply names the hosted page. */
export default defineApi({ access: 'run:pay', params: runParams }, ({ db, actor, params, now }) => startDeposit(db, usePayments(), { runId: params.runId, actor, now }))
