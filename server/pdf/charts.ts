import { disc } from '../../shared/charts/disc'
import type { DiscInput } from '../../shared/charts/disc'
import { temperatures } from '../../shared/charts/temperatures'
import { clockWords, durationWords, numberWords, temperatureWords } from '../../shared/charts/words'
import { isoTime } from '../../shared/record/entry'
import type { LimitChart } from '../../shared/record/record-charts'
import type { Sheet } from './sheet'
import { COLOURS } from './sheet'

/** The time without control: ink at 8 parts in 100 on white, mixed beforehand since PDF/A-1 knows no transparency. */
const SHADE = '#EDEDED'

/** The screen's drawings are laid out for words of 16 px; on paper words are 8 points. */
const SCALE = 0.56

/** The disc around a centre. @param across points; the labels at the rim stand inside it */
export function drawDisc(sheet: Sheet, input: DiscInput, centre: { x: number, y: number }, across: number): void {
  const { doc, type } = sheet
  const drawn = disc(input)
  const scale = across / drawn.size
  const elapsed = durationWords(Math.round(input.elapsedMinutes * 60))
  const figure = sheet.element('Figure', { bbox: [centre.x - across / 2, centre.y - across / 2, centre.x + across / 2, centre.y + across / 2], alt: `Disc: ${elapsed} without control. The red ring is the limit of every case. ${input.cases.map(item => `${item.name}, highest ${highest(item.readings)} of its limit ${numberWords(item.limit)}`).join('; ')}` })
  sheet.content(figure, 'Figure', () => {
    doc.save().translate(centre.x, centre.y).scale(scale)
    doc.lineWidth(1.25).strokeColor(COLOURS.grid)
    for (const radius of [drawn.usualRadius, ...drawn.gridRadii]) doc.circle(0, 0, radius).stroke()
    for (const { from, to } of drawn.spokes) doc.moveTo(from.x, from.y).lineTo(to.x, to.y).stroke()
    if (drawn.planned) doc.path(drawn.planned).fill(COLOURS.field)
    if (drawn.elapsed) doc.path(drawn.elapsed).fill(COLOURS.ink)
    doc.circle(0, 0, drawn.limitRadius).lineWidth(3.5).stroke(COLOURS.limit)
    for (const trace of drawn.traces) {
      if (trace.path) doc.path(trace.path).lineJoin('round').lineWidth(trace.shortest ? 4 : 1.75).stroke(COLOURS.trace)
      for (const mark of trace.marks) doc.path(mark.path).lineWidth(1).fillAndStroke(COLOURS.trace, '#FFFFFF')
    }
    doc.restore()
    for (const label of drawn.labels) type.drawCentred(label.text, centre.x + label.at.x * scale, centre.y + label.at.y * scale + 2.6, { size: 7.5, colour: COLOURS['ink-2'] })
    type.drawCentred(elapsed, centre.x, centre.y + 1, { face: 'bold', size: 10, colour: COLOURS.ink })
    type.drawCentred('without control', centre.x, centre.y + 11, { size: 7, colour: COLOURS['ink-2'] })
  })
  figure.end()
}

const highest = (readings: readonly { value: number }[]) => readings.length === 0 ? 'not read' : numberWords(Math.max(...readings.map(reading => reading.value)))

/** Product temperatures against the time of day, at the present place of the sheet. */
export function drawTemperatures(sheet: Sheet, chart: LimitChart, timeZone: string, height: number): void {
  const { doc, type } = sheet
  const drawn = temperatures({ width: sheet.width / SCALE, height: height / SCALE, dark: chart.dark, limits: chart.limits, cases: chart.cases })
  const [x, y] = [(value: number) => sheet.left + value * SCALE, (value: number) => sheet.y + value * SCALE]
  const { plot } = drawn
  const small = { size: 7.5, colour: COLOURS['ink-2'] }
  const stride = Math.ceil(drawn.xTicks.length * 34 / ((plot.right - plot.left) * SCALE))
  const figure = sheet.element('Figure', { bbox: [sheet.left, sheet.y, sheet.right, sheet.y + height], alt: `Product temperatures in °${chart.unit}, limit ${temperatureWords(chart.limit, chart.unit)}. ${chart.cases.map(item => `${item.name}: highest ${highest(item.readings)}`).join('; ')}` })
  sheet.content(figure, 'Figure', () => {
    for (const span of drawn.dark) {
      doc.rect(x(span.x), y(plot.top), span.width * SCALE, (plot.bottom - plot.top) * SCALE).fill(SHADE)
      if (span.width * SCALE > 62) type.draw('without control', x(span.x) + 4, y(span.wordsY), small)
    }
    for (const tick of drawn.yTicks) {
      doc.moveTo(x(plot.left), y(tick.y)).lineTo(x(plot.right), y(tick.y)).lineWidth(0.6).stroke(COLOURS.grid)
      type.drawRight(numberWords(tick.value, Number.isInteger(tick.value) ? 0 : 1), x(plot.left) - 6, y(tick.y) + 2.6, small)
    }
    drawn.xTicks.forEach((tick, index) => {
      doc.moveTo(x(tick.x), y(plot.bottom)).lineTo(x(tick.x), y(plot.bottom) + 3).lineWidth(0.6).stroke(COLOURS['ink-2'])
      if (index % stride === 0) type.drawCentred(clockWords(isoTime(chart.origin + tick.minute * 60_000), timeZone), x(tick.x), y(plot.bottom) + 12, small)
    })
    for (const limit of drawn.limits) {
      doc.moveTo(x(plot.left), y(limit.y)).lineTo(x(plot.right), y(limit.y)).lineWidth(1.2).stroke(COLOURS.limit)
      type.draw(limit.label, x(plot.left) + 3, y(limit.y) - 3, { size: 7.5, colour: COLOURS.limit })
    }
    for (const line of drawn.lines) {
      if (line.path) doc.save().translate(sheet.left, sheet.y).scale(SCALE).path(line.path).lineJoin('round').lineWidth(2).stroke(COLOURS.trace).restore()
      for (const dot of line.dots) doc.circle(x(dot.x), y(dot.y), 1.7).fill(COLOURS.trace)
      doc.save().translate(sheet.left, sheet.y).scale(SCALE).path(line.leader).lineWidth(0.9).stroke(COLOURS.field).restore()
      type.draw(type.fit(line.name, sheet.right - x(line.label.x), { size: 7.5 }), x(line.label.x), y(line.label.y) + 2.6, { size: 7.5, colour: COLOURS.ink })
    }
  })
  figure.end()
  sheet.y += height
}
