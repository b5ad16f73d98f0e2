import { mayOpen } from '~/utils/page-roles'

/** Comfort, not protection: sends people who are not signed in to the sign-in page, and hides pages of other roles. */
export default defineNuxtRouteMiddleware((to) => {
  if (to.meta.auth === false) return
  const { data } = useAuth()
  const person = data.value?.user
  if (!person) return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { return: to.fullPath } })
  if (!mayOpen(person, to.meta.roles)) return abortNavigation(createError({ statusCode: 404, message: 'There is no such page for your role.' }))
})
