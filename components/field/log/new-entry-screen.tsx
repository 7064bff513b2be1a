import type { NewEntryName } from '../route'
import { NoteScreen } from './note-screen'
import { PhotoScreen } from './photo-screen'
import { SymptomScreen } from './symptom-screen'
import { VoiceScreen } from './voice-screen'

const SCREENS = {
  note: NoteScreen,
  symptom: SymptomScreen,
  photo: PhotoScreen,
  voice: VoiceScreen,
} satisfies Record<NewEntryName, unknown>

/** The form of one kind of entry that a person writes of their own accord. */
export function NewEntryScreen({ name, jobId }: { name: NewEntryName; jobId: string }) {
  const Form = SCREENS[name]
  return <Form jobId={jobId} />
}
