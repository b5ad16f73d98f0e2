import { useServerConfig } from '#server/utils/config'

/** Fails the start with clear words when the environment is incomplete, and tells the sign-in module its address. */
export default defineNitroPlugin(() => {
  if (import.meta.prerender) return
  const { origin } = useServerConfig()
  process.env.AUTH_ORIGIN ??= `${origin}/api/auth`
})
