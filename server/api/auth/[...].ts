import { eq } from 'drizzle-orm'
import CredentialsProvider from 'next-auth/providers/credentials'
import { NuxtAuthHandler } from '#auth'
import type { Role } from '~~/shared/schemas/people'
import { people } from '~~/server/database/schema'
import { useDatabase } from '~~/server/utils/database'
import { signIn } from '~~/server/utils/people/sign-in'

declare module 'next-auth' {
  interface Session { user?: { id: string, name: string, email: string, role: Role, mustChangePassword: boolean } }
  interface User { sessionVersion: number }
}
declare module 'next-auth/jwt' {
  interface JWT { sessionVersion?: number }
}

// The provider is CommonJS: in the built server its function is one level deeper.
const Credentials = ((CredentialsProvider as unknown as { default?: typeof CredentialsProvider }).default ?? CredentialsProvider)
const WEEK = 7 * 24 * 60 * 60

export default NuxtAuthHandler({
  secret: useRuntimeConfig().authSecret,
  session: { strategy: 'jwt', maxAge: WEEK },
  pages: { signIn: '/sign-in', error: '/sign-in' },
  providers: [
    Credentials({
      name: 'credentials',
      credentials: { email: { type: 'email' }, password: { type: 'password' } },
      async authorize(credentials, request) {
        const person = await signIn(credentials, addressOf(request.headers ?? {}))
        return person ? { id: person.id, name: person.name, email: person.email, sessionVersion: person.sessionVersion } : null
      },
    }),
  ],
  callbacks: {
    jwt({ token, user }) {
      return user ? { sub: user.id, sessionVersion: user.sessionVersion } : token
    },
    // Role and session version are read afresh: a token alone proves nothing.
    async session({ session, token }) {
      const [person] = token.sub ? await useDatabase().select().from(people).where(eq(people.id, token.sub)) : []
      if (!person || person.disabledAt || person.sessionVersion !== token.sessionVersion) return {} as typeof session
      const { id, name, email, role, mustChangePassword } = person
      return { ...session, user: { id, name, email, role, mustChangePassword } }
    },
    redirect({ url, baseUrl }) {
      return url.startsWith('/') && !url.startsWith('//') && !url.startsWith('/\\') ? `${baseUrl}${url}` : new URL(url, baseUrl).origin === new URL(baseUrl).origin ? url : baseUrl
    },
  },
})

/** Address of the client for the sign-in limits: set by the session middleware from the socket. */
function addressOf(headers: Record<string, string>): string {
  return headers['x-holdover-address'] ?? 'unknown'
}
