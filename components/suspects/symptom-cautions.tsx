import { Caution } from '@/components/ui/caution'
import type { SymptomItem } from '@/lib/model/code-book'

/** What a complaint warns of before anything is touched. */
export function SymptomCautions({ symptom }: { symptom: SymptomItem }) {
  if (symptom.cautions.length === 0) return null
  return (
    <div className="grid gap-2">
      {symptom.cautions.map(({ signal, text }) => (
        <Caution key={text} signal={signal}>
          {text}
        </Caution>
      ))}
    </div>
  )
}
