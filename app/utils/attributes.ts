/** What a wrapped control passes on to its input: all attributes but those that place the whole of it. */
export function withoutPlace({ class: _class, style: _style, ...rest }: Record<string, unknown>): Record<string, unknown> {
  return rest
}
