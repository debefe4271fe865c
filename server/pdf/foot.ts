import { fontFiles } from './fonts'
import { COLOURS, MARGIN } from './sheet'
import type { Typesetter } from './typesetter'

type Document = PDFKit.PDFDocument
type Reference = ReturnType<Document['ref']>

/** What pdfkit knows of an embedded font; its types leave this out. */
interface EmbeddedFont { id: string, ref: () => Reference, encode: (text: string) => [string[], unknown], widthOfString: (text: string, size: number) => number }

const SIZE = 8.5
/** Room for "page 1234 of 1234". */
const WIDTH = 110

/**
 * The foot of every page. How many pages there are is known only at the end, so that the words "page 1 of 9"
 * are a small drawing that each page refers to and that is written last: pages go out as they are finished.
 */
export class Feet {
  private readonly pages: Reference[] = []

  /** @param words at the left of every foot */
  constructor(private readonly doc: Document, private readonly type: Typesetter, private readonly words: string) {}

  /** Draws the foot of the page that was begun just now. */
  draw(left: number, right: number, bottom: number): void {
    const { doc } = this
    const y = bottom + MARGIN.foot - 30
    const total = doc.ref({ Type: 'XObject', Subtype: 'Form', BBox: [0, -4, WIDTH, 12] })
    this.pages.push(total)
    const page = doc.page as unknown as { xobjects: Record<string, Reference>, height: number }
    page.xobjects.Foot = total
    doc.markContent('Artifact', { type: 'Pagination' })
    doc.moveTo(left, y - 12).lineTo(right, y - 12).lineWidth(0.9).stroke(COLOURS.ink)
    this.type.draw(this.words, left, y, { face: 'mono', size: 7.5, colour: COLOURS['ink-2'] })
    // The page is drawn upside down, from its top; the small drawing stands upright.
    doc.addContent(`q 1 0 0 -1 ${right - WIDTH} ${y} cm /Foot Do Q`)
    doc.endMarkedContent()
  }

  /** Writes the count of pages into all of them. */
  end(): void {
    const [name] = fontFiles('plain')
    const font = (this.doc.font(name!) as unknown as { _font: EmbeddedFont })._font
    const [red, green, blue] = [1, 3, 5].map(start => (Number.parseInt(COLOURS['ink-2'].slice(start, start + 2), 16) / 255).toFixed(3))
    this.pages.forEach((reference, index) => {
      const text = `page ${index + 1} of ${this.pages.length}`
      const x = (WIDTH - font.widthOfString(text, SIZE)).toFixed(2)
      Object.assign(reference.data, { Resources: { ProcSet: ['PDF', 'Text'], Font: { [font.id]: font.ref() } } })
      reference.end(`${red} ${green} ${blue} rg BT /${font.id} ${SIZE} Tf ${x} 0 Td <${font.encode(text)[0].join('')}> Tj ET`)
    })
  }
}
