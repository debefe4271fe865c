/** What is said beside the rulebooks and never gives a verdict: how fast food spoils, and what must not be read into it. */
import type { SourceMark } from './types'

export interface Advisory {
  title: string
  words: string
  source: string
  mark: SourceMark
}

export const ADVISORIES: Advisory[] = [
  {
    title: 'Growth of Listeria monocytogenes',
    words: 'In the cold it grows as the square of the temperature above −1.18 °C: at 8 °C about 2.2 times as fast as at 5 °C, at 12 °C about 4.5 times.',
    source: 'square-root model of the FDA and FSIS risk assessment of 2003; its lowest temperature of growth',
    mark: 'M',
  },
  {
    title: 'Smoked seafood at 5 °C',
    words: 'Listeria monocytogenes typically grows tenfold in 4 to 11 days: 0.09 to 0.25 powers of ten a day.',
    source: 'FDA and FSIS risk assessment of 2003',
    mark: 'V',
  },
  {
    title: 'Milk',
    words: 'Listeria monocytogenes doubles in 29.7 to 45.6 hours at 4 °C, in 8.7 to 14.6 hours at 8 °C, in 4.5 to 6.9 hours at 13 °C and in 1.7 to 1.9 hours at 21 °C.',
    source: 'Rosenow and Marth 1987, abstract',
    mark: 'V',
  },
]
