/** Pages for administrators. The API decides by itself; this only spares others an empty page. */
export default defineNuxtRouteMiddleware(() => {
  const { data } = useAuth()
  if (data.value?.user?.role !== 'administrator') return abortNavigation(createError({ statusCode: 403, statusMessage: 'Forbidden', message: 'This is for an administrator' }))
})
