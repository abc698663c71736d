/** Which columns there is room for; a spanning cell must know their number. */
export interface BreachColumns {
  readonly where: boolean
  readonly firstSeen: boolean
  readonly assignee: boolean
  readonly count: number
}

const ALWAYS = 5

/** The columns of the log in a window so many px wide; assignees take one only where there are some. */
export function breachColumns(width: number, isAssigned: boolean): BreachColumns {
  const [where, firstSeen, assignee] = [width >= 900, width >= 1060, isAssigned && width >= 1240]
  const optional = [where, firstSeen, assignee].filter(Boolean).length
  return { where, firstSeen, assignee, count: ALWAYS + optional }
}
