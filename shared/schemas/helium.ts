import { z } from 'zod'
import { idSchema, quantitySchema } from '#shared/schemas/common'

export const deliveryParams = z.object({ deliveryId: idSchema }).strict()

/** What arrived of a delivery. */
export const deliveryReceiveSchema = z.object({ litres: quantitySchema('the litres that arrived', 'L', { above: 0, most: 5000 }) }).strict()
