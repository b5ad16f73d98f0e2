import { boardMonthQuery } from '#shared/schemas/board'
import { readBoardMonth } from '#server/services/board/month'
import { defineApi } from '#server/utils/define-api'

/** Each day's free cryostats. */
export default defineApi({ access: 'board:read', query: boardMonthQuery }, ({ db, actor, query }) => readBoardMonth(db, { actor, ...query }))
