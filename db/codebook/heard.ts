/** A condition that tells: of 100 such calls with the fault behind them, how many riders say so; `otherwise` for the rest. */
export const heard = (
  id: string,
  name: string,
  otherwise: number,
  of100: Record<string, number>,
) => ({ id, name, tells: { of100, otherwise } })

/** A condition that is written down and moves no suspect. */
export const noted = (id: string, name: string) => ({ id, name, tells: null })
