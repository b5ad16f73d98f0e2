import { z } from 'zod'
import { datasetParams } from '#shared/schemas/results'
import { getDataset, getPoints } from '#server/services/results/get-dataset'
import { defineApi } from '#server/utils/define-api'

const query = z.object({ points: z.enum(['yes', 'no']).default('yes') }).strict()

/** A dataset with its analyses, and its points unless `points=no`. */
export default defineApi({ access: 'dataset:read', params: datasetParams, query }, async ({ db, actor, params, query }) => {
  const request = { datasetId: params.datasetId, actor }
  return { ...await getDataset(db, request), points: query.points === 'yes' ? await getPoints(db, request) : null }
})
