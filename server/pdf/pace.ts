type Document = PDFKit.PDFDocument

/**
 * Keeps the drawing no further ahead of its reader than the stream's own buffer, and gives the event loop to others
 * meanwhile. pdfkit itself writes as fast as it draws, whoever reads.
 */
export class Pace {
  private wake: (() => void) | null = null

  constructor(private readonly doc: Document) {
    const waken = () => { this.wake?.() }
    doc._read = waken
    doc.once('close', waken)
  }

  /**
   * Lets others work, and waits for the reader where it is behind.
   * @throws Error when nobody reads any more
   */
  async rest(): Promise<void> {
    await new Promise(resolve => setImmediate(resolve))
    while (!this.doc.destroyed && this.doc.readableLength > this.doc.readableHighWaterMark) {
      await new Promise<void>((resolve) => { this.wake = resolve })
      this.wake = null
    }
    if (this.doc.destroyed) throw new Error('Nobody reads this paper any more')
  }
}
