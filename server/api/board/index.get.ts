import { boardWithHeliumQuery } from '#shared/schemas/board'
import { readBoard } from '#server/services/board/queries'
import { defineApi } from '#server/utils/define-api'

/** The board over some days. */
export default defineApi({ access: 'board:read', query: boardWithHeliumQuery }, ({ db, actor, query, now }) => readBoard(db, { actor, ...query.range, withHelium: query.withHelium, now }))
