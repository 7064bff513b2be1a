import type { WordItem } from '@/lib/model/code-book'
import { type WordRow, words } from './words'

const SYSTEMS: readonly WordRow[] = [
  ['oilSystem', 'Oil'],
  ['throttleSystem', 'Throttle'],
  ['handStartSystem', 'Recoil and kick start'],
  ['frameSystem', 'Frame, bars and body'],
]

const CIRCUITS: readonly WordRow[] = [['oilPressure', 'Engine oil pressure or level']]

const PARTS: readonly WordRow[] = [
  ['throttleCable', 'Throttle cable'],
  ['gripHousing', 'Throttle grip or lever housing'],
  ['throttleSpring', 'Throttle return spring'],
  ['engineOil', 'Engine oil, one litre'],
  ['twoStrokeOil', 'Two-stroke oil, one litre'],
  ['gearOil', 'Gear oil, one litre'],
  ['oilHose', 'Oil hose with clamps'],
  ['oilFilterPart', 'Oil filter with seal'],
  ['oilPumpUnit', 'Oil pump'],
  ['oilFeedPump', 'Two-stroke oil feed pump'],
  ['oilSwitch', 'Oil pressure or level switch'],
  ['gasketSet', 'Gaskets and shaft seals'],
  ['coldPutty', 'Two-part putty for metal and tank'],
  ['recoilRope', 'Recoil rope and handle'],
  ['recoilSpringPart', 'Recoil spring'],
  ['recoilPawlSet', 'Recoil pawls and springs'],
  ['recoilUnit', 'Recoil starter, whole'],
  ['kickGearSet', 'Kick gear and ratchet'],
  ['kickSpring', 'Kick return spring'],
  ['kickLever', 'Kick lever with bolt'],
  ['decompressorPart', 'Decompressor or its cable'],
  ['tankCap', 'Tank cap with vent'],
  ['pumpPlateSeal', 'Seal of the pump plate'],
  ['fuelTapPart', 'Fuel tap'],
  ['rodAndBearings', 'Rod, crank and bearings'],
  ['handlebarSet', 'Handlebar, levers and mounts'],
  ['engineMountPart', 'Engine mount'],
  ['shieldBolts', 'Shield bolts, clips and washers'],
  ['frameRepair', 'Frame or cage section'],
]

const TOOLS: readonly WordRow[] = [
  ['listeningRod', 'Listening rod or long screwdriver'],
  ['magnetStick', 'Small magnet'],
  ['drainPan', 'Drain pan'],
  ['cleanRag', 'Clean rag or paper'],
  ['softStick', 'Clean wooden stick or drinking straw'],
  ['oilGauge', 'Oil pressure gauge with adapter'],
]

/** Words this chapter needs beyond the first ones. Ids are unique over all kinds. */
export const MISHAP_WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
