import type { Lessons, LessonsAccepted } from '~~/shared/schemas/lessons'

/** What a sealed outage teaches. */
export function fetchLessons(outage: string): Promise<Lessons> {
  const path: string = `/api/outages/${outage}/lessons`
  return $fetch<Lessons>(path)
}

export function acceptLessons(outage: string, body: LessonsAccepted): Promise<Lessons> {
  const path: string = `/api/outages/${outage}/lessons`
  return $fetch<Lessons>(path, { method: 'POST', body })
}
