/** A letter's HTML as a frame shows it: its links open beside the page that shows it. */
export function letterFrame(html: string): string {
  return html.replace(/<a /g, '<a target="_blank" rel="noopener" ')
}
