import { boardQuery } from '#shared/schemas/board'
import { readHeliumForecast } from '#server/services/helium/forecast-queries'
import { defineApi } from '#server/utils/define-api'

/** The helium strip; declared with the board's action, because everyone who sees the board sees the line. */
export default defineApi({ access: 'board:read', query: boardQuery }, ({ db, actor, query, now }) => readHeliumForecast(db, { actor, ...query, now }))
