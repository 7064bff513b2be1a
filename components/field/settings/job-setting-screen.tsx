import type { SettingName } from '../route'
import { AirScreen } from './air-screen'
import { ComplaintScreen } from './complaint-screen'
import { MachineScreen } from './machine-screen'
import { PlaceScreen } from './place-screen'

const SCREENS = {
  setPlace: PlaceScreen,
  setAir: AirScreen,
  setComplaint: ComplaintScreen,
  setMachine: MachineScreen,
} satisfies Record<SettingName, unknown>

/** The form that changes one thing of a job. */
export function JobSettingScreen({ name, jobId }: { name: SettingName; jobId: string }) {
  const Form = SCREENS[name]
  return <Form jobId={jobId} />
}
