/**
 * DM1 and DM2 from raw bus frames, as a desk tool (rule R11): the sender, single frames, and messages of more
 * than eight bytes put together from their packets. Layouts after SAE J1939-21 and -73; the transport (announced by
 * 20 hex to all or 10 hex to one address in PGN 60416, packets of seven bytes in PGN 60160) is from memory.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type CodeProblem, type Dm1, type DtcVersion, readDm1 } from './codes'

/** One frame: 29-bit identifier and up to eight bytes. */
export type Frame = { id: number; bytes: readonly number[] }

/** Fault codes one sender told: active ones (DM1) or earlier ones (DM2), `sender` its address 0 to 255. */
export type FaultMessage = { kind: 'active' | 'earlier'; sender: number; message: Dm1 }

/**
 * `frame` counts from 1. `packetMissing` names the packet that was due; `unfinished` a message cut off, by the end or
 * by the next announcement; `badMessage` bytes that are no message, or an announcement or packet of a wrong length.
 */
export type FrameProblem =
  | { kind: 'notFrame'; frame: number }
  | { kind: 'packetMissing'; frame: number; packet: number }
  | { kind: 'unfinished'; sender: number }
  | { kind: 'badMessage'; frame: number; problem: CodeProblem }

/**
 * Priority, parameter group, sender and the address meant of a 29-bit identifier; below format 240 the group's low
 * byte is that address, above it the message is for all (255).
 */
export function identifierOf(id: number): {
  priority: number
  pgn: number
  sender: number
  to: number
} {
  const group = (id >> 8) & 0x3_ff_ff
  const toOne = ((id >> 16) & 0xff) < 240
  return {
    priority: (id >>> 26) & 7,
    pgn: toOne ? group & 0x3_ff_00 : group,
    sender: id & 0xff,
    to: toOne ? group & 0xff : ALL,
  }
}

/**
 * Frames from text, one a line: eight hex digits of the identifier, then its bytes, with `#`, `:` or blanks
 * between, and with a bus name before or a length in brackets where a logger wrote them. Empty lines are skipped.
 */
export function framesFromText(text: string): Result<Frame[], FrameProblem> {
  const frames: Frame[] = []
  for (const line of text.split('\n').map((l) => l.trim())) {
    if (line === '') continue
    const match = LINE.exec(line)
    if (match === null) return fail({ kind: 'notFrame', frame: frames.length + 1 })
    const [, id = '', data = ''] = match
    const bytes = (data.match(/[0-9a-f]{2}/gi) ?? []).map((pair) => Number.parseInt(pair, 16))
    frames.push({ id: Number.parseInt(id, 16), bytes })
  }
  return ok(frames)
}

const LINE =
  /^(?:\S+\s+)?(?:0x)?([01][0-9a-f]{7})\s*[#:]?\s*(?:\[\d\])?\s*((?:[0-9a-f]{2}[\s,]*){1,8})$/i

const ACTIVE = 0xfeca
const EARLIER = 0xfecb
const ANNOUNCE = 0xec00
const PACKET = 0xeb00
const ALL = 255
const TO_ALL = 0x20
const TO_ONE = 0x10
const PACKET_BYTES = 7
/** Longest message of the transport: 255 packets. */
const MOST_BYTES = 255 * PACKET_BYTES

/** A message being put together: what is due and what came. */
type Open = { sender: number; pgn: number; length: number; bytes: number[]; came: number }

/**
 * The fault messages in the frames, in the order they were complete; other traffic is passed over. A packet out
 * of turn and a message left unfinished are refused, for half a list of codes would be read as a whole one.
 */
export function faultMessages(
  frames: readonly Frame[],
  version?: DtcVersion,
): Result<FaultMessage[], FrameProblem> {
  const found: FaultMessage[] = []
  const open = new Map<string, Open>()
  for (const [i, frame] of frames.entries()) {
    const step = stepOf(open, frame, i + 1)
    if (step === null) continue
    if (!step.ok) return step
    const { pgn, sender, bytes } = step.value
    const message = readDm1(bytes, version)
    if (!message.ok) return fail({ kind: 'badMessage', frame: i + 1, problem: message.problem })
    const kind = pgn === ACTIVE ? 'active' : 'earlier'
    found.push({ kind, sender, message: message.value })
  }
  const [left] = open.values()
  return left === undefined ? ok(found) : fail({ kind: 'unfinished', sender: left.sender })
}

type Whole = { pgn: number; sender: number; bytes: readonly number[] }
type Step = Result<Whole, FrameProblem> | null

/** What a frame completes: a single fault frame, the last packet of a long message, or nothing yet. */
function stepOf(open: Map<string, Open>, { id, bytes }: Frame, frame: number): Step {
  const { pgn, sender, to } = identifierOf(id)
  // A sender may have one message under way to all and one to each address.
  const way = `${sender} ${to}`
  if (isFaultGroup(pgn)) return ok({ pgn, sender, bytes })
  if (pgn === ANNOUNCE) return announced(open, { way, sender, to }, bytes, frame)
  const message = pgn === PACKET ? open.get(way) : undefined
  if (message === undefined) return null
  const [number = 0, ...data] = bytes
  if (number !== message.came + 1)
    return fail({ kind: 'packetMissing', frame, packet: message.came + 1 })
  const due = Math.min(PACKET_BYTES, message.length - message.bytes.length)
  if (data.length < due) return wrongLength(frame, `${due} bytes in the packet`, data.length)
  message.came = number
  message.bytes.push(...data.slice(0, due))
  if (message.bytes.length < message.length) return null
  open.delete(way)
  return ok(message)
}

const isFaultGroup = (pgn: number): boolean => pgn === ACTIVE || pgn === EARLIER

/** Opens the message that an announcement is about; other groups and answers to announcements are passed over. */
function announced(
  open: Map<string, Open>,
  { way, sender, to }: { way: string; sender: number; to: number },
  bytes: readonly number[],
  frame: number,
): Step {
  const [control, low = 0, high = 0, packets = 0, , p1 = 0, p2 = 0, p3 = 0] = bytes
  const pgn = p1 | (p2 << 8) | (p3 << 16)
  if (control !== (to === ALL ? TO_ALL : TO_ONE) || !isFaultGroup(pgn)) return null
  if (open.has(way)) return fail({ kind: 'unfinished', sender })
  const length = low | (high << 8)
  if (length <= 8 || length > MOST_BYTES || packets !== Math.ceil(length / PACKET_BYTES))
    return wrongLength(frame, '9 to 1785 bytes in packets of 7', length)
  open.set(way, { sender, pgn, length, bytes: [], came: 0 })
  return null
}

const wrongLength = (frame: number, expected: string, got: number): Step =>
  fail({ kind: 'badMessage', frame, problem: { kind: 'wrongLength', expected, got } })
