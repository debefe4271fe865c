import { posix } from 'node:path'
import ts from 'typescript'

/** One import of a file: from where, and whether only types come. */
export interface Import {
  /** A path from the project's root, or the name of a package. */
  from: string
  local: boolean
  /** Named from where the file lies, as in `../near`. */
  relative: boolean
  typeOnly: boolean
}

/** What the names of vitest.config.ts and of Nuxt stand for. */
const ALIASES: [string, string][] = [['~~/', ''], ['@@/', ''], ['#shared/', 'shared/'], ['~/', 'app/'], ['@/', 'app/']]

/** The engines that the offline phone runs as the server does. */
const ENGINES = ['holding', 'hold', 'cover', 'order', 'duration', 'window'].map(name => `server/utils/${name}`)

/** What a primitive may import: its like, the look, and the passing on of HTML attributes. */
const PLAIN = ['app/components/ui', 'shared/look', 'app/utils/attributes']

/** Packages that tie a rule to a screen, a server or a table. */
const TIED = /^(vue|@vue|nuxt|@nuxt|#app|#imports|pinia|h3|nitropack|drizzle-orm|postgres|node:)(\/|$)|^node:/

/** What a primitive of components/ui may not call, even where Nuxt would import it by itself. */
const FETCHES = /(?<![\w.])(\$fetch|fetch|useFetch|useLazyFetch|useAsyncData|useLazyAsyncData|useNuxtData|use\w+Store|use\w+Query)\s*\(/

/**
 * The imports, re-exports and dynamic imports of a file.
 * @param file path from the project's root
 * @param source its text; of a Vue file, the scripts are read
 */
export function importsOf(file: string, source: string): Import[] {
  const script = file.endsWith('.vue')
    ? [...source.matchAll(/<script\b[^>]*>([\s\S]*?)<\/script>/g)].map(match => match[1]).join('\n')
    : source
  const tree = ts.createSourceFile('file.ts', script, ts.ScriptTarget.Latest)
  const found: Import[] = []
  const add = (specifier: ts.Node | undefined, typeOnly: boolean) => {
    if (specifier && ts.isStringLiteralLike(specifier)) found.push({ ...resolve(file, specifier.text), relative: specifier.text.startsWith('.'), typeOnly })
  }
  const visit = (node: ts.Node) => {
    if (ts.isImportDeclaration(node)) add(node.moduleSpecifier, node.importClause?.isTypeOnly ?? false)
    if (ts.isExportDeclaration(node)) add(node.moduleSpecifier, node.isTypeOnly)
    if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) add(node.argument.literal, true)
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) add(node.arguments[0], false)
    ts.forEachChild(node, visit)
  }
  visit(tree)
  return found
}

function resolve(file: string, specifier: string): { from: string, local: boolean } {
  if (specifier.startsWith('.')) return { from: posix.join(posix.dirname(file), specifier), local: true }
  const alias = ALIASES.find(([name]) => specifier.startsWith(name))
  return alias
    ? { from: posix.normalize(alias[1] + specifier.slice(alias[0].length)), local: true }
    : { from: specifier, local: false }
}

const isBelow = (path: string, directory: string) => path === directory || path.startsWith(`${directory}/`) || path === `${directory}.ts`
const isEngine = (path: string) => ENGINES.some(engine => isBelow(path, engine))

// Nuxt leaves shared/ out of what it bundles for rendering: a relative path would then lead nowhere.
const reachesOver = (one: Import) => one.relative && !one.typeOnly && isBelow(one.from, 'shared')
const OVER = 'what is bundled for rendering names shared/ as ~~/shared/'

/**
 * The import rules that a file breaks; none for most files.
 * @returns one sentence for each breach
 */
export function breachesOf(file: string, source: string): string[] {
  if (!isBelow(file, 'app') && !isBelow(file, 'shared/record') && !isEngine(file)) return []
  const imports = importsOf(file, source)
  const tell = (bad: (one: Import) => boolean, rule: string) => imports.filter(bad).map(one => `${file} imports ${one.from}: ${rule}`)

  if (isBelow(file, 'shared/record')) {
    return tell(one => one.local ? !isBelow(one.from, 'shared') : TIED.test(one.from), 'the record is pure and knows no screen, server or table')
  }
  if (isEngine(file)) {
    return [
      ...tell(one => !one.local || !(isBelow(one.from, 'shared') || isEngine(one.from)), 'an engine imports shared/ and other engines alone, for it runs on the phone too'),
      ...tell(reachesOver, OVER),
    ]
  }
  if (isBelow(file, 'app/components/ui')) {
    const calls = FETCHES.exec(source)
    return [
      ...tell(one => one.local ? !PLAIN.some(room => isBelow(one.from, room)) : /^(pinia|ofetch)$/.test(one.from), 'a primitive knows no store, no query and nothing of the trade'),
      ...calls ? [`${file} calls ${calls[1]}: a primitive fetches nothing`] : [],
    ]
  }
  // Row types may come from the tables, since types leave nothing in what the browser runs.
  return [
    ...tell(one => one.local && isBelow(one.from, 'server') && !isEngine(one.from) && !(one.typeOnly && isBelow(one.from, 'server/database/schema')), 'of server/ the browser gets the engines alone'),
    ...tell(reachesOver, OVER),
  ]
}
