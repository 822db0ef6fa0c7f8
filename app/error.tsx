'use client'

export { ErrorScreen as default } from '@/components/shell/error-screen'
