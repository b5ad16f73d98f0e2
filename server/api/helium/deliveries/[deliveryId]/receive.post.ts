import { deliveryParams, deliveryReceiveSchema } from '#shared/schemas/helium'
import { receiveDelivery } from '#server/services/helium/receive-delivery'
import { defineApi } from '#server/utils/define-api'

/** Books a delivery that has come. */
export default defineApi({ access: 'helium:write', params: deliveryParams, body: deliveryReceiveSchema }, async ({ db, actor, params, body, now }) => {
  await receiveDelivery(db, { deliveryId: params.deliveryId, litres: body.litres, actor, now })
  return { received: true }
})
