/** Pages for everybody but technicians. The API decides by itself; this only spares them an empty page. */
export default defineNuxtRouteMiddleware(() => {
  const { data } = useAuth()
  if (data.value?.user?.role === 'technician') return abortNavigation(createError({ statusCode: 403, statusMessage: 'Forbidden', message: 'This is for a supervisor, an auditor or an administrator' }))
})
