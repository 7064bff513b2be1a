import type { WordItem } from '@/lib/model/code-book'
import { type WordRow, words } from './words'

const SYSTEMS: readonly WordRow[] = [
  ['driveSystem', 'Belt, chain and shafts'],
  ['gearSystem', 'Gears and shifting'],
  ['brakeSystem', 'Brakes'],
  ['steeringSystem', 'Steering and suspension'],
  ['wheelSystem', 'Wheels and tyres'],
  ['trackSystem', 'Track and slides'],
]

const CIRCUITS: readonly WordRow[] = [
  ['fourWheelActuator', 'Four-wheel drive actuator'],
  ['gearPosition', 'Gear position sensor'],
  ['steeringAssistMotor', 'Steering assist motor'],
  ['wheelSpeed', 'Wheel speed sensors'],
  ['parkBrakeSwitch', 'Park brake switch'],
]

const PARTS: readonly WordRow[] = [
  ['driveBelt', 'Drive belt'],
  ['driveClutchUnit', 'Drive clutch (on the engine)'],
  ['drivenClutchUnit', 'Driven clutch'],
  ['driveChain', 'Drive chain with joining link'],
  ['sprocketSet', 'Sprockets with bolts'],
  ['clutchPlates', 'Clutch plates'],
  ['clutchCable', 'Clutch cable or clutch seals'],
  ['axleShaft', 'Axle shaft with joints'],
  ['chainCaseKit', 'Chain, sprockets and tensioner of the chain case'],
  ['fourWheelUnit', 'Four-wheel drive actuator or hub'],
  ['parkBrakeSwitchUnit', 'Park brake switch'],
  ['gearboxInside', 'Gears and shafts of the gearbox'],
  ['shiftPins', 'Shift rod, pins and clips'],
  ['shiftForkSet', 'Shift forks'],
  ['shiftSpringSet', 'Shift return spring and ratchet'],
  ['gearSwitch', 'Gear position sensor'],
  ['brakeFluidBottle', 'Brake fluid of the marked kind'],
  ['brakeHose', 'Brake hose with washers'],
  ['padSet', 'Brake pads'],
  ['caliperUnit', 'Brake caliper or seal kit'],
  ['masterKit', 'Brake master cylinder kit'],
  ['parkBrakeCable', 'Park brake cable'],
  ['brakeCable', 'Brake cable or rod'],
  ['brakeDisc', 'Brake disc'],
  ['wheelSpeedUnit', 'Wheel speed sensor'],
  ['tieRod', 'Tie rod with ends'],
  ['ballJoint', 'Ball joint'],
  ['suspensionArm', 'Suspension arm with bolts'],
  ['wheelBearingSet', 'Wheel bearings and seals'],
  ['wheelNutSet', 'Wheel nuts and studs'],
  ['steeringBushes', 'Steering post bushes and clamp'],
  ['assistUnit', 'Steering assist unit'],
  ['shockUnit', 'Shock absorber'],
  ['ski', 'Ski'],
  ['skiRunner', 'Ski runner'],
  ['forkLeg', 'Fork leg'],
  ['headBearingSet', 'Steering head bearings'],
  ['swingArmBearings', 'Swing arm bearings'],
  ['tyrePlugs', 'Tyre plugs'],
  ['innerTube', 'Inner tube'],
  ['valveCore', 'Tyre valve'],
  ['tyreCover', 'Tyre'],
  ['wheelRim', 'Wheel rim'],
  ['trackUnit', 'Track'],
  ['slideSet', 'Slides'],
  ['idlerWheel', 'Idler wheel with bearing'],
  ['driveBearing', 'Drive shaft bearing'],
  ['skidArm', 'Rear suspension arm or rail'],
]

const TOOLS: readonly WordRow[] = [
  ['guardedStandTool', 'Stand with straps and guard'],
  ['chocks', 'Wheel chocks'],
  ['steelRule', 'Steel rule'],
  ['tapeMeasure', 'Tape measure'],
  ['pryBar', 'Pry bar'],
  ['bleedHose', 'Bleed hose and bottle'],
  ['tyrePump', 'Tyre pump'],
  ['tyreGauge', 'Low-pressure tyre gauge'],
  ['soapySpray', 'Soapy water'],
  ['tyreLevers', 'Tyre levers'],
  ['warmWater', 'Warm water in a flask'],
  ['pullScale', 'Spring scale'],
]

/** Systems, circuits, parts and tools of drive, brakes, steering, wheels and track. */
export const DRIVE_WORDS: WordItem[] = [
  ...words('system', SYSTEMS),
  ...words('circuit', CIRCUITS),
  ...words('part', PARTS),
  ...words('tool', TOOLS),
]
