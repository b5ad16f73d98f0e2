import { openDatabase } from '#server/db/client'
import { applyMigrations } from '#server/db/migrate'
import { useServerConfig } from '#server/utils/config'
import { endDatabaseUsers, setDatabaseOpening, setOpenDatabase } from '#server/utils/database'
import { log } from '#server/utils/log'

/** Opens and migrates the database before the first answer; closes it last. */
export default defineNitroPlugin((nitro) => {
  if (import.meta.prerender) return
  const { databaseUrl, dataFolder } = useServerConfig()
  const opening = openDatabase(databaseUrl ? { url: databaseUrl } : { folder: dataFolder }).then(async (database) => {
    const count = await applyMigrations(database.db, readMigration)
    log.info({ driver: database.driver, migrations: count }, 'database open')
    setOpenDatabase(database)
    return database
  })
  setDatabaseOpening(opening)
  opening.catch((error: Error) => {
    log.fatal(error.message)
    process.exit(1)
  })

  nitro.hooks.hook('close', async () => {
    const database = await opening
    await endDatabaseUsers()
    setOpenDatabase(undefined)
    await database.close()
  })
})

async function readMigration(path: string): Promise<string> {
  const text = await useStorage('assets:migrations').getItem<string | object>(path.replaceAll('/', ':'))
  if (text === null) throw new Error(`migration file ${path} is missing from the build`)
  return typeof text === 'string' ? text : JSON.stringify(text)
}
