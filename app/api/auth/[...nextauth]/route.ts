import NextAuth from 'next-auth'
import { authOptions } from '@/lib/server/http/auth-options'

type Segment = { params: Promise<{ nextauth: string[] }> }

function handle(request: Request, segment: Segment): Promise<Response> {
  return NextAuth(request as never, segment as never, authOptions())
}

export { handle as GET, handle as POST }
