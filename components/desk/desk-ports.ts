import { systemClock } from '@/lib/ports/clock'
import { browserShopLine, type ShopLine } from '@/lib/ports/shop-line'
import { browserTabs, type Tabs } from '@/lib/ports/tabs'

/** The outside things the desk uses; tests hand in their own. */
export type DeskPorts = { line: ShopLine; tabs(): Tabs; now(): number }

export const browserDeskPorts: DeskPorts = {
  line: browserShopLine,
  tabs: browserTabs,
  now: () => systemClock.now(),
}
