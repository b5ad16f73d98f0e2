import { z } from 'zod'
import { idSchema } from '#shared/schemas/common'

export const invoiceParams = z.object({ invoiceId: idSchema }).strict()
export const groupParams = z.object({ groupId: idSchema }).strict()
