/** One temperature at a minute counted from the moment control was lost; negative before it. Unit is the chart's own. */
export interface ChartReading {
  minute: number
  value: number
}

/** A point of a drawing, in the drawing's own units, y downwards. */
export interface DrawnPoint {
  x: number
  y: number
}
