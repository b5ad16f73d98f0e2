import { useServerConfig } from '#server/utils/config'

/** Fails the start with clear words when the environment is incomplete. */
export default defineNitroPlugin(() => {
  if (!import.meta.prerender) useServerConfig()
})
