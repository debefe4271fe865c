import { z } from 'zod'
import { ALERT_LEVELS } from '../record/kinds/alerts'

/** Longest wait before an alert goes on to the next ones, minutes. */
export const PASS_ON_MAX = 120
export const PEOPLE_PER_LEVEL_MAX = 20

const minutes = z.number({ invalid_type_error: 'Enter a number' }).int('Whole minutes').min(1, 'At least 1 minute').max(PASS_ON_MAX, `At most ${PASS_ON_MAX} minutes`)

/** Who is told at one level: whoever has the outage in hand, the site's supervisors, and people by name. */
export const alertLevelSchema = z.object({
  answerable: z.boolean(),
  supervisors: z.boolean(),
  people: z.array(z.string().uuid()).max(PEOPLE_PER_LEVEL_MAX, `At most ${PEOPLE_PER_LEVEL_MAX} people`),
}).strict()
export type AlertLevel = z.output<typeof alertLevelSchema>

const isEmpty = (level: AlertLevel) => !level.answerable && !level.supervisors && level.people.length === 0

/** Who is told of alerts at a site, and after how many minutes without an acknowledgement they go on. */
export const alertRulesSchema = z.object({
  levels: z.array(alertLevelSchema).length(ALERT_LEVELS),
  passOnAfter: z.array(minutes).length(ALERT_LEVELS - 1), // from the first level to the second, from the second to the third
}).strict().superRefine(({ levels }, context) => {
  if (levels[0] && isEmpty(levels[0])) context.addIssue({ code: 'custom', path: ['levels', 0], message: 'Somebody must be told first' })
  if (levels[1] && levels[2] && isEmpty(levels[1]) && !isEmpty(levels[2])) context.addIssue({ code: 'custom', path: ['levels', 1], message: 'Nobody is told second: name them here, and nobody third' })
  levels.forEach((level, index) => {
    if (new Set(level.people).size < level.people.length) context.addIssue({ code: 'custom', path: ['levels', index, 'people'], message: 'Somebody stands here twice' })
  })
})
export type AlertRules = z.output<typeof alertRulesSchema>

/** A site that has said nothing of its own: the technician first, the site's supervisors after five minutes. */
export const PLAIN_ALERT_RULES: AlertRules = {
  levels: [
    { answerable: true, supervisors: false, people: [] },
    { answerable: false, supervisors: true, people: [] },
    { answerable: false, supervisors: false, people: [] },
  ],
  passOnAfter: [5, 10],
}
