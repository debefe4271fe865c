import type { Database } from '../../utils/database'

/** Seeds the demo once: nothing happens where anybody exists already. @param now Unix ms */
export async function seedDemo(_db: Database, _now: number): Promise<void> {
}
