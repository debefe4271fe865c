/** Who is not signed in goes to the sign-in page; who has a temporary password chooses one of their own first. */
export default defineNuxtRouteMiddleware((to) => {
  if (useError().value) {
    // An error page is rendered without a session: to guard it would lead to the sign-in page and back for ever.
    to.meta.auth = false
    return
  }
  if (to.meta.auth === false || to.matched.length === 0) return
  const { status, data } = useAuth()
  if (status.value !== 'authenticated') return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { callbackUrl: to.fullPath } })
  if (data.value?.user?.mustChangePassword && to.path !== '/account/password') return navigateTo('/account/password')
})
