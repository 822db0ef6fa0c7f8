import NextAuth from 'next-auth'
import { authOptions } from '@/lib/server/http/auth-options'
import { guardSignIn } from '@/lib/server/http/guard-sign-in'

type Segment = { params: Promise<{ nextauth: string[] }> }

function handle(request: Request, segment: Segment): Promise<Response> {
  return guardSignIn(request, (guarded) => NextAuth(guarded as never, segment as never, authOptions()))
}

export { handle as GET, handle as POST }
