import { printDegrees } from '@/lib/diag/place-text'
import type { JobSetting, MachineSetting } from '@/lib/model/setting'

/** Single values of a job or machine, in words. */
type Setting = JobSetting | MachineSetting

const NAMES: Record<Setting['field'], string> = {
  complaintWords: 'Complaint',
  place: 'Place',
  airTempC: 'Air temperature',
  weather: 'Weather',
  hours: 'Engine hours',
  unitNumber: 'Unit number',
  serial: 'Serial number',
  year: 'Year',
}

/** What the value is of. */
export const settingName = ({ field }: Setting): string => NAMES[field]

const goodTo = (metres: number | null): string =>
  metres === null ? 'of an accuracy not told' : `good to ${Math.round(metres)} m`

/** The value as it is shown in a line; a field that was left empty says so. */
export function settingWords(setting: Setting): string {
  if (setting.value === null) return 'nothing'
  switch (setting.field) {
    case 'complaintWords':
      return `“${setting.value}”`
    case 'place': {
      const { words, source, accuracyMetres } = setting.value
      const how = source === 'fix' ? `position fix ${goodTo(accuracyMetres)}` : 'typed'
      return [printDegrees(setting.value), how, words].filter(Boolean).join(', ')
    }
    case 'airTempC':
      return `${String(setting.value).replace('-', '−')} °C`
    case 'hours':
      return `${setting.value} h`
    default:
      return String(setting.value)
  }
}
