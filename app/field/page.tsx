import type { Metadata } from 'next'
import { FieldApp } from '@/components/field/field-app'

export const dynamic = 'force-static'
export const metadata: Metadata = { title: 'Field' }

/** The one static document behind every address under /field; the screens are drawn on the phone. */
export default function FieldPage() {
  return <FieldApp />
}
