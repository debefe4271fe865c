import type { PointColumn } from './columns'
import type { ImportFault } from './points'

/** A row as it will land, each cell as the file would write it, and what it changes. */
export interface LandedRow {
  row: number
  tag: string
  outcome: 'new' | 'changed' | 'unchanged'
  cells: Record<PointColumn, string>
  changes: { column: PointColumn, from: string, to: string }[]
}

export interface ImportPreview {
  rows: LandedRow[]
  faults: ImportFault[]
  counts: Record<LandedRow['outcome'], number>
  /** points of the controller that the file does not name; they stay as they are */
  untouched: number
}
