// Runs the queue's tasks until it is told to stop. Started by npm start beside the server.
import { startWork } from '@/lib/work/run'

const queueUrl = process.env.DATABASE_WORK_URL
if (!queueUrl) throw new Error('DATABASE_WORK_URL is missing: npm start sets it')
const work = await startWork({ queueUrl })
for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  // Ctrl-C reaches this process as well as its parent, which then sends SIGTERM: once is enough.
  process.once(signal, () => void work.stop().catch(() => undefined))
}
await work.ended
process.exit(0)
