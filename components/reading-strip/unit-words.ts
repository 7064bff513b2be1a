import type { Quantity } from '@/lib/model/meter-profile'

const LABELS: Partial<Record<Quantity, Readonly<Record<string, string>>>> = {
  dcVoltage: { V: 'V DC', mV: 'mV DC' },
  acVoltage: { V: 'V AC', mV: 'mV AC' },
  temperature: { degC: '°C', degF: '°F' },
}

/** A unit a figure was typed in, as it stands on the keypad; direct and alternating volts told apart. */
export const unitLabel = (quantity: Quantity, id: string): string => LABELS[quantity]?.[id] ?? id
