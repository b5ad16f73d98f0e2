import { type FileStore, openFileStore } from '#server/adapters/storage/files'
import { useServerConfig } from '#server/utils/config'

let store: FileStore | undefined

/** The file store of this server, for routes and jobs; services take it as an argument. */
export function useFileStore(): FileStore {
  store ??= openFileStore({ dataFolder: useServerConfig().dataFolder })
  return store
}
