/** What an API answer said went wrong. */
export interface ApiFault {
  /** HTTP status; 0 when no answer came. */
  status: number
  field: string | null
  reason: string
}

/** Reads the fault out of what `$fetch` throws; words for every case, never a stack. */
export function readFault(error: unknown): ApiFault {
  const { status, statusCode, data } = (error ?? {}) as { status?: number, statusCode?: number, data?: { data?: { field?: unknown, reason?: unknown } } }
  const code = status ?? statusCode ?? 0
  const { field, reason } = data?.data ?? {}
  return {
    status: code,
    field: typeof field === 'string' ? field : null,
    reason: typeof reason === 'string' ? reason : code === 0 ? 'Holdover cannot be reached. Try again in a moment.' : `Something failed on our side (${code}). Try again.`,
  }
}
