import type { Storage } from 'unstorage'
import type { Database } from '../../utils/database'
import type { Cast } from './people'
import type { SeededEquipment } from './sites'

/** What a story is told on. `now`: when the demo begins, Unix ms */
export interface Stage { db: Database, storage: Storage, now: number, equipment: SeededEquipment, cast: Cast }
