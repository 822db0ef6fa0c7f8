import { type NextRequest, NextResponse } from 'next/server'
import { askedPathHeader } from '@/lib/shared/way-back'

/** Tells the pages behind the sign-in which address was asked for: a layout does not learn it otherwise. */
export function proxy(request: NextRequest): NextResponse {
  const { pathname, searchParams } = request.nextUrl
  const asked = new URLSearchParams(searchParams)
  asked.delete('_rsc')
  const headers = new Headers(request.headers)
  headers.set(askedPathHeader, asked.size === 0 ? pathname : `${pathname}?${asked}`)
  return NextResponse.next({ request: { headers } })
}

export const config = { matcher: '/circuits/:path*' }
