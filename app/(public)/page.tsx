import type { Metadata } from 'next'
import { Landing } from '@/components/public/landing'

export const metadata: Metadata = { title: { absolute: 'Halfsplit: find the fault in a circuit' } }

export default function LandingPage() {
  return <Landing />
}
