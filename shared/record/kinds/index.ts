import type { z } from 'zod'
import { darkKinds } from './dark'
import { handKinds } from './hand'
import { handsKinds } from './hands'
import { planKinds } from './plan'
import { reviewKinds } from './review'
import { roundKinds } from './rounds'
import { serverKinds } from './server'

/**
 * Every kind of entry, each with a schema per version. To add one: its schema in one of the files
 * beside this, its rules in ../rules, its effect in ../effects, its words in ../words; the compiler
 * names each place that is missing.
 */
export const KINDS = { ...planKinds, ...handKinds, ...handsKinds, ...roundKinds, ...darkKinds, ...reviewKinds, ...serverKinds }

export type EntryKind = keyof typeof KINDS
type Schema = z.ZodTypeAny
type NewestOf<Versions> = Versions extends { 3: infer S extends Schema } ? S : Versions extends { 2: infer S extends Schema } ? S : Versions extends { 1: infer S extends Schema } ? S : never
type NewestSchema<K extends EntryKind> = NewestOf<(typeof KINDS)[K]>
/** The body of a kind as it is signed now (its newest version); older ones are read through ../newest. */
export type BodyOf<K extends EntryKind> = z.output<NewestSchema<K>>
/** The body as a form may give it: defaults may be left out. */
export type BodyInput<K extends EntryKind> = z.input<NewestSchema<K>>
export type ServerKind = keyof typeof serverKinds

export function isEntryKind(kind: string): kind is EntryKind {
  return Object.hasOwn(KINDS, kind)
}

export function isServerKind(kind: EntryKind): kind is ServerKind {
  return Object.hasOwn(serverKinds, kind)
}

/** The schema of a kind and version, or null when this program does not know that version. */
export function schemaOf(kind: EntryKind, version: number): z.ZodTypeAny | null {
  const versions: Record<number, z.ZodTypeAny> = KINDS[kind]
  return versions[version] ?? null
}

/** The schema in which new entries of a kind are written. */
export function newestSchema<K extends EntryKind>(kind: K): NewestSchema<K> {
  return schemaOf(kind, newestVersion(kind)) as NewestSchema<K>
}

/** The version in which new entries of a kind are written. */
export function newestVersion(kind: EntryKind): number {
  return Math.max(...Object.keys(KINDS[kind]).map(Number))
}
