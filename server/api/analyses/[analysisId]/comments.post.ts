import { analysisParams, commentSchema } from '#shared/schemas/results'
import { addComment } from '#server/services/results/add-comment'
import { defineApi } from '#server/utils/define-api'

/** Adds a remark to the analysis. */
export default defineApi({ access: 'analysis:comment', params: analysisParams, body: commentSchema, status: 201 }, ({ db, actor, params, body, now }) =>
  addComment(db, { analysisId: params.analysisId, text: body.text, actor, now }))
