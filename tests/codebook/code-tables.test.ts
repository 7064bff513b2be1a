import { expect, test } from 'vitest'
import { BOOK_ITEMS } from '@/db/codebook/book'
import { STORIES } from '@/db/codebook/code-tells'
import { FMI_LINE } from '@/db/codebook/fmi'
import { FMI_UPPER } from '@/db/codebook/fmi-upper'
import { PCODE_KINDS } from '@/db/codebook/pcode-kinds'
import { PCODES } from '@/db/codebook/pcodes'
import { SPNS } from '@/db/codebook/spn'

const FAILURES = [...FMI_LINE, ...FMI_UPPER, ...PCODE_KINDS]
const spn = (n: number) => SPNS.find((s) => s.spn === n)
const pcode = (code: string) => PCODES.find((p) => p.code === code)
const fmi = (n: number) => FAILURES.find((f) => f.fmi === n)

test('[CB17] the tables hold all rows of the checked starting set', () => {
  expect(SPNS).toHaveLength(174)
  expect(PCODES.filter((p) => !/from memory/.test(p.source)).length).toBeGreaterThan(100)
  expect(PCODES.length).toBeGreaterThanOrEqual(500)
  expect(new Set(PCODES.map((p) => p.code)).size).toBe(PCODES.length)
  expect(FAILURES.filter((f) => f.fmi !== null).map((f) => f.fmi)).toEqual(
    Array.from({ length: 32 }, (_, n) => n),
  )
})

// Number and subject: SAE J1939 Digital Annex, also seen in an open J1939 list.
test.each([
  [51, /throttle position/, 'throttleSensor'],
  [84, /vehicle speed/, 'vehicleSpeed'],
  [94, /fuel supply.*pressure/, 'fuelPressure'],
  [102, /intake manifold.*pressure/, 'mapSensor'],
  [110, /coolant temperature/, 'coolantTempSensor'],
  [158, /key-switch battery voltage/, 'systemVoltage'],
  [168, /battery voltage/, 'systemVoltage'],
  [190, /engine speed/, 'crankSensor'],
  [620, /5 V sensor supply/, 'sensorSupply'],
  [636, /position sensor \(crank or cam\)/, 'crankSensor'],
  [651, /injector, cylinder 1/, 'injector1'],
  [677, /starter motor relay/, 'starterCircuit'],
  [1268, /ignition coil 1/, 'ignitionCoil1'],
  [1269, /ignition coil 2/, 'ignitionCoil2'],
  [1323, /misfire, cylinder 1/, null],
] as const)(
  '[CB17] SPN %i is what the standard says (SAE J1939 Digital Annex)',
  (n, name, circuit) => {
    expect(spn(n)?.name).toMatch(name)
    expect(spn(n)?.circuit).toBe(circuit)
  },
)

// No standard number for tip-over; pump and fan relays, gear and steering are often coded makers' own way.
test('[CB17] numbers that makers use their own way say so', () => {
  for (const n of [520192, 931, 1071, 523, 1807]) expect(spn(n)?.makersDiffer, `${n}`).toBe(true)
  for (const n of [168, 1268, 190]) expect(spn(n)?.makersDiffer, `${n}`).toBe(false)
  expect(SPNS.some((s) => s.spn < 520192 && /tip-over/.test(s.name))).toBe(false)
})

// SAE J1939-73 Appendix A / ISO 11783-12 Annex E, seen in two open libraries.
test.each([
  [0, /above normal, most severe/, 'highSevere'],
  [1, /below normal, most severe/, 'lowSevere'],
  [2, /erratic, intermittent or incorrect/, 'erratic'],
  [3, /voltage above normal, or shorted to a high source/, 'voltHigh'],
  [4, /voltage below normal, or shorted to a low source/, 'voltLow'],
  [5, /current below normal, or open circuit/, 'currentLow'],
  [6, /current above normal, or grounded circuit/, 'currentHigh'],
  [7, /mechanical system not responding/, 'mechanical'],
  [8, /abnormal frequency, pulse width or period/, 'frequency'],
  [9, /abnormal update rate/, 'updateRate'],
  [10, /abnormal rate of change/, 'rateOfChange'],
  [12, /bad intelligent device/, 'badDevice'],
  [13, /out of calibration/, 'calibration'],
  [19, /received network data in error/, 'networkError'],
  [22, /reserved/, 'reserved'],
  [31, /condition/, 'exists'],
] as const)(
  '[CB17] FMI %i is what the standard says (SAE J1939-73 Appendix A)',
  (n, name, failure) => {
    expect(fmi(n)?.name).toMatch(name)
    expect(fmi(n)?.failure).toBe(failure)
  },
)

test('[CB17] kind 3 speaks for part, wiring and driver and against supply; kind 5 for what is open', () => {
  const high = fmi(3)?.byRole
  expect(Math.min(high?.part ?? 0, high?.wiring ?? 0, high?.driver ?? 0)).toBeGreaterThan(
    5 * (high?.supply ?? 100),
  )
  const open = fmi(5)?.byRole
  expect(Math.min(open?.part ?? 0, open?.wiring ?? 0)).toBeGreaterThan(open?.driver ?? 100)
})

test('[CB17] kinds that tell nothing of the cause move nothing within the circuit', () => {
  for (const n of [9, 11, 14, 19, 22, 30, 31]) expect(fmi(n)?.byRole, `${n}`).toBeNull()
})

// SAE J2012 / ISO 15031-6.
test.each([
  ['P0107', /pressure signal low/, 'low', 'mapSensor'],
  ['P0117', /coolant temperature signal low/, 'low', 'coolantTempSensor'],
  ['P0122', /throttle position A signal low/, 'low', 'throttleSensor'],
  ['P0123', /throttle position A signal high/, 'high', 'throttleSensor'],
  ['P0201', /injector circuit, cylinder 1/, 'circuit', 'injector1'],
  ['P0230', /fuel pump primary/, 'circuit', 'fuelPump'],
  ['P0301', /misfire cylinder 1/, 'condition', null],
  ['P0335', /crank position sensor A circuit/, 'circuit', 'crankSensor'],
  ['P0336', /crank position sensor A out of plausible range/, 'range', 'crankSensor'],
  ['P0337', /crank position sensor A signal low/, 'low', 'crankSensor'],
  ['P0351', /ignition coil A circuit/, 'circuit', 'ignitionCoil1'],
  ['P0352', /ignition coil B circuit/, 'circuit', 'ignitionCoil2'],
  ['P0505', /idle control system/, 'condition', 'idleAir'],
  ['P0562', /system voltage low/, 'low', 'systemVoltage'],
  ['P0563', /system voltage high/, 'high', 'systemVoltage'],
  ['P0641', /sensor reference voltage A circuit open/, 'circuit', 'sensorSupply'],
] as const)('[CB17] %s is what the standard says (SAE J2012)', (code, name, failure, circuit) => {
  expect(pcode(code)?.name).toMatch(name)
  expect(pcode(code)?.failure).toBe(failure)
  expect(pcode(code)?.circuit).toBe(circuit)
})

test('[CB17] the classic groups keep their suffixes: x2 low, x3 high, x4 intermittent (SAE J2012)', () => {
  for (const base of ['P011', 'P012']) {
    const group = base === 'P011' ? ['P0112', 'P0113', 'P0114'] : ['P0122', 'P0123', 'P0124']
    expect(group.map((code) => pcode(code)?.failure)).toEqual(['low', 'high', 'intermittent'])
  }
})

test('[CB4] every row names the standard it comes from, or says it is from memory', () => {
  for (const row of [...SPNS, ...PCODES, ...FAILURES])
    expect(row.source, row.id).toMatch(/^SAE J(1939|2012)/)
  expect(pcode('P0562')?.source).toMatch(/from memory/)
  expect(pcode('P0351')?.source).not.toMatch(/from memory/)
})

// SAE J2012 / ISO 15031-6, from memory.
test.each([
  ['P0016', /crank and cam/, 'range', 'camSensor'],
  ['P0087', /pressure too low/, 'tooLow', 'fuelPressure'],
  ['P0113', /intake air temperature signal high/, 'high', 'airTempSensor'],
  ['P0135', /heater circuit/, 'circuit', 'oxygenHeater'],
  ['P0171', /too lean, bank 1/, 'condition', null],
  ['P0217', /over temperature/, 'condition', null],
  ['P0340', /cam position sensor circuit/, 'circuit', 'camSensor'],
  ['P0480', /cooling fan 1 control/, 'circuit', 'fanControl'],
  ['P0500', /vehicle speed sensor/, 'circuit', 'vehicleSpeed'],
  ['P0616', /starter relay circuit low/, 'low', 'starterCircuit'],
  ['P0622', /generator field/, 'circuit', 'chargingSystem'],
  ['P2106', /power held back/, 'condition', null],
  ['P2111', /stuck open/, 'stuck', 'throttleActuator'],
  ['P2128', /accelerator position E signal high/, 'high', 'gripSensor'],
  ['P2138', /accelerator position D\/E disagree/, 'range', 'gripSensor'],
  ['P2503', /charging system voltage low/, 'tooLow', 'chargingSystem'],
  ['U0073', /gone off the network/, 'noSignal', 'network'],
  ['U0100', /engine module A not heard/, 'noSignal', 'network'],
  ['U0131', /power steering module/, 'noSignal', 'network'],
] as const)('[CB17] %s is what the standard says (memory)', (code, name, failure, circuit) => {
  expect(pcode(code)?.name).toMatch(name)
  expect([pcode(code)?.failure, pcode(code)?.circuit]).toEqual([failure, circuit])
})

test('[CB17] only standard codes stand in the table; letters that makers put to parts of their own say so', () => {
  for (const { code } of PCODES) expect(code).toMatch(/^(P0|P2|U0)[0-9A-F]{3}$/)
  for (const code of ['P2122', 'P2138', 'P0500', 'P0705', 'P0385', 'P0352'])
    expect(pcode(code)?.makersDiffer, code).toBe(true)
  for (const code of ['P0117', 'P0335', 'P0562', 'U0100'])
    expect(pcode(code)?.makersDiffer, code).toBe(false)
})

test('[CB22] each story has its codes, each code one story, and every fault in it is set more often than none', () => {
  const codes = STORIES.flatMap(({ pcodes, spns }) => [...pcodes, ...spns.map(String)])
  expect(new Set(codes).size).toBe(codes.length)
  for (const { id, pcodes, spns, of100, otherwise } of STORIES) {
    for (const code of pcodes) expect(pcode(code), code).toBeDefined()
    for (const number of spns) expect(spn(number), `${number}`).toBeDefined()
    expect(Object.keys(of100).length, id).toBeGreaterThan(1)
    for (const [fault, figure] of Object.entries(of100))
      expect(figure, `${id}: ${fault}`).toBeGreaterThanOrEqual(1.5 * otherwise)
  }
})

test('[CB22] the book keeps of a code what its faults and circuits bear out, and nothing else', () => {
  const faults = new Set(BOOK_ITEMS.flatMap((i) => (i.kind === 'fault' ? [i.id] : [])))
  const misfire = BOOK_ITEMS.find((i) => i.id === 'pcodeP0301')
  if (misfire?.kind !== 'pcode') throw new Error('no P0301')
  expect(Object.keys(misfire.tells?.of100 ?? {})).toContain('sparkPlugBad')
  for (const item of BOOK_ITEMS)
    if (item.kind === 'spn' || item.kind === 'pcode')
      for (const fault of Object.keys(item.tells?.of100 ?? {})) expect(faults).toContain(fault)
})

test('[R11] what a blink pattern means is no part of the book: it comes from a table of the shop', () => {
  for (const item of BOOK_ITEMS)
    if (item.kind === 'spn' || item.kind === 'pcode')
      expect(`${item.id} ${item.name}`).not.toMatch(/blink|flash code/i)
  expect(new Set(BOOK_ITEMS.map((i) => i.kind))).not.toContain('flash')
})
