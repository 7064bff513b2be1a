/**
 * DM1 and DM2 from raw bus frames, as a desk tool (rule R11): the sender, single frames, and messages of more
 * than eight bytes put together from their packets. Layouts after SAE J1939-21 and -73; the broadcast transport
 * (announcement 20 hex in PGN 60416, packets in PGN 60160) is from memory.
 */
import { fail, ok, type Result } from '@/lib/model/result'
import { type CodeProblem, type Dm1, type DtcVersion, readDm1 } from './codes'

/** One frame: 29-bit identifier and up to eight bytes. */
export type Frame = { id: number; bytes: readonly number[] }

/** Fault codes one sender told: active ones (DM1) or earlier ones (DM2), `sender` its address 0 to 255. */
export type FaultMessage = { kind: 'active' | 'earlier'; sender: number; message: Dm1 }

/** `frame` counts from 1. `packetMissing` names the packet that was due; `unfinished` a message cut off. */
export type FrameProblem =
  | { kind: 'notFrame'; frame: number }
  | { kind: 'packetMissing'; frame: number; packet: number }
  | { kind: 'unfinished'; sender: number }
  | { kind: 'badMessage'; frame: number; problem: CodeProblem }

/** Priority, parameter group and sender of an identifier; below 240 the group's low byte is the address meant. */
export function identifierOf(id: number): { priority: number; pgn: number; sender: number } {
  const format = (id >> 16) & 0xff
  const group = (id >> 8) & 0x3_ff_ff
  const pgn = format < 240 ? group & 0x3_ff_00 : group
  return { priority: (id >>> 26) & 7, pgn, sender: id & 0xff }
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
const BROADCAST = 0x20

/** A message being put together: what is due and what came. */
type Open = { pgn: number; length: number; packets: number; bytes: number[]; came: number }

/**
 * The fault messages in the frames, in the order they were complete; other traffic is passed over. A packet out
 * of turn and a message left unfinished are refused, for half a list of codes would be read as a whole one.
 */
export function faultMessages(
  frames: readonly Frame[],
  version?: DtcVersion,
): Result<FaultMessage[], FrameProblem> {
  const found: FaultMessage[] = []
  const open = new Map<number, Open>()
  for (const [i, frame] of frames.entries()) {
    const { pgn, sender } = identifierOf(frame.id)
    const step = stepOf(open, pgn, sender, frame.bytes)
    if (step === null) continue
    if ('missing' in step)
      return fail({ kind: 'packetMissing', frame: i + 1, packet: step.missing })
    const message = readDm1(step.bytes, version)
    if (!message.ok) return fail({ kind: 'badMessage', frame: i + 1, problem: message.problem })
    const kind = step.pgn === ACTIVE ? 'active' : 'earlier'
    found.push({ kind, sender, message: message.value })
  }
  const [left] = open.keys()
  return left === undefined ? ok(found) : fail({ kind: 'unfinished', sender: left })
}

type Step = { pgn: number; bytes: readonly number[] } | { missing: number } | null

/** What a frame completes: a single fault frame, the last packet of a long message, or nothing yet. */
function stepOf(
  open: Map<number, Open>,
  pgn: number,
  sender: number,
  bytes: readonly number[],
): Step {
  if (pgn === ACTIVE || pgn === EARLIER) return { pgn, bytes }
  if (pgn === ANNOUNCE) {
    const [control = 0, low = 0, high = 0, packets = 0, , p1 = 0, p2 = 0, p3 = 0] = bytes
    const about = p1 | (p2 << 8) | (p3 << 16)
    if (control === BROADCAST && (about === ACTIVE || about === EARLIER))
      open.set(sender, { pgn: about, length: low | (high << 8), packets, bytes: [], came: 0 })
    return null
  }
  const message = pgn === PACKET ? open.get(sender) : undefined
  if (message === undefined) return null
  const [number = 0, ...data] = bytes
  if (number !== message.came + 1) return { missing: message.came + 1 }
  message.came = number
  message.bytes.push(...data)
  if (message.came < message.packets) return null
  open.delete(sender)
  return { pgn: message.pgn, bytes: message.bytes.slice(0, message.length) }
}
