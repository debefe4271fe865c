/** Bytes of a point list, as UTF-8. Apart from its reader, so that a page need not carry that. */
export const FILE_MAX_BYTES = 2_000_000
