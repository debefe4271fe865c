// The rules are this project's own; no published source.
import { readFileSync, readdirSync } from 'node:fs'
import { posix } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { breachesOf, importsOf } from './imports'

const root = fileURLToPath(new URL('../..', import.meta.url))

const files = ['app', 'server', 'shared'].flatMap(room => readdirSync(posix.join(root, room), { recursive: true, withFileTypes: true })
  .filter(entry => entry.isFile() && /\.(ts|vue)$/.test(entry.name))
  .map(entry => posix.relative(root, posix.join(entry.parentPath, entry.name))))

describe('imports', () => {
  it.each(['shared/record/', 'server/utils/holding/', 'app/components/ui/'])('finds files to judge below %s', (room) => {
    expect(files.filter(file => file.startsWith(room)).length).toBeGreaterThan(3)
  })

  it('keeps to the rules in every file', () => {
    expect(files.flatMap(file => breachesOf(file, readFileSync(posix.join(root, file), 'utf8')))).toEqual([])
  }, 60_000)
})

describe('importsOf', () => {
  it('reads every form of import, from scripts and from Vue files', () => {
    const source = [
      'import { a } from \'./near\'',
      'import type { B } from \'~~/shared/b\'',
      'export * from \'../far\'',
      'export type { C } from \'~/c\'',
      'const later = () => import(\'zod\')',
      'type D = import(\'#shared/d\').D',
    ].join('\n')
    const expected = [
      { from: 'app/pages/near', local: true, relative: true, typeOnly: false },
      { from: 'shared/b', local: true, relative: false, typeOnly: true },
      { from: 'app/far', local: true, relative: true, typeOnly: false },
      { from: 'app/c', local: true, relative: false, typeOnly: true },
      { from: 'zod', local: false, relative: false, typeOnly: false },
      { from: 'shared/d', local: true, relative: false, typeOnly: true },
    ]
    expect(importsOf('app/pages/one.ts', source)).toEqual(expected)
    expect(importsOf('app/pages/one.vue', `<script setup lang="ts">\n${source}\n</script>\n<template><p>import x from 'y'</p></template>`)).toEqual(expected)
  })
})

describe('breachesOf', () => {
  it.each([
    ['shared/record/fold.ts', 'import { ref } from \'vue\''],
    ['shared/record/fold.ts', 'import type { H3Event } from \'h3\''],
    ['shared/record/fold.ts', 'import { eq } from \'drizzle-orm\''],
    ['shared/record/fold.ts', 'import { x } from \'../../server/utils/x\''],
    ['shared/record/fold.ts', 'import { readFileSync } from \'node:fs\''],
    ['server/utils/hold/index.ts', 'import { db } from \'../database\''],
    ['server/utils/hold/index.ts', 'import { z } from \'zod\''],
    ['server/utils/hold/index.ts', 'import { a } from \'../../../shared/schemas/a\''],
    ['app/utils/names.ts', 'import { a } from \'../../shared/schemas/a\''],
    ['server/utils/window/rules/a.ts', 'import { x } from \'~~/app/utils/x\''],
    ['app/pages/index.vue', '<script setup>import { db } from \'~~/server/utils/database\'</script>'],
    ['app/pages/index.vue', '<script setup>import { outages } from \'~~/server/database/schema\'</script>'],
    ['app/components/ui/UiButton.vue', '<script setup>import { useOutbox } from \'~/stores/outbox\'</script>'],
    ['app/components/ui/UiButton.vue', '<script setup>import { fold } from \'~~/shared/record\'</script>'],
    ['app/components/ui/UiButton.vue', '<script setup>await $fetch(\'/api/outages\')</script>'],
    ['app/components/ui/UiButton.vue', '<script setup>const outbox = useOutboxStore()</script>'],
  ])('finds the breach in %s: %s', (file, source) => {
    expect(breachesOf(file, source)).toHaveLength(1)
  })

  it.each([
    ['shared/record/fold.ts', 'import { z } from \'zod\'\nimport { a } from \'../schemas/a\''],
    ['server/utils/hold/index.ts', 'import { a } from \'../cover\'\nimport { b } from \'~~/shared/schemas/b\'\nimport { c } from \'./c\''],
    ['server/utils/database.ts', 'import { drizzle } from \'drizzle-orm/postgres-js\''],
    ['app/pages/index.vue', '<script setup>import { judge } from \'~~/server/utils/holding\'</script>'],
    ['app/pages/index.vue', '<script setup>import type { OutageRow } from \'~~/server/database/schema\'</script>'],
    ['app/components/ui/UiButton.vue', '<script setup>import { palette } from \'~~/shared/look/palette\'\nimport { ref } from \'vue\'</script>'],
  ])('lets %s pass: %s', (file, source) => {
    expect(breachesOf(file, source)).toEqual([])
  })
})
