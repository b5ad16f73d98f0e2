import { z } from 'zod'

export const cryostatParams = z.object({ slug: z.string().regex(/^[a-z0-9-]{1,40}$/, 'There is no such cryostat.') }).strict()
