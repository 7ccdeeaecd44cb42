import { type Document, isAlias, isMap, isScalar, isSeq, LineCounter, type Node, type ParsedNode, parseDocument } from 'yaml'
import { SceneError, type SceneProblem } from './error.js'
import type { ScenePath, SourceLocation } from './types.js'

/** Of the faults of a text that is not YAML, those after the first few say nothing new. */
const mostErrors = 10

type SceneNode = Node | ParsedNode | null | undefined

/** A YAML text with the places of its keys. */
export class YamlDocument {
  readonly value: unknown
  private readonly lines = new LineCounter()
  private readonly document: Document.Parsed

  /** Throws a SceneError for text that is not one sound YAML document. */
  constructor(
    private readonly text: string,
    private readonly file: string
  ) {
    try {
      this.document = parseDocument(text, { lineCounter: this.lines, prettyErrors: false, logLevel: 'error' })
    } catch (error) {
      throw this.unsound(0, (error as Error).message)
    }
    if (this.document.errors.length > 0)
      throw new SceneError(this.document.errors.slice(0, mostErrors).map(({ pos, message }) => this.problemAt(pos[0], message)))
    try {
      this.value = this.document.toJS({ maxAliasCount: 100 })
    } catch (error) {
      throw this.unsound(0, (error as Error).message)
    }
  }

  /** Where a path stands: its key, or its entry of a list; the nearest parent of what is missing. */
  locate(path: ScenePath): SourceLocation {
    return this.at(this.walk(path).offset)
  }

  /** The value at a path as written, shortened to one line; undefined for the whole file and where there is none. */
  written(path: ScenePath): string | undefined {
    const { node, whole } = this.walk(path)
    if (path.length === 0 || !whole || !node?.range) return undefined
    const text = this.text.slice(node.range[0], node.range[1]).trim()
    if (!isScalar(node) && text.includes('\n')) return undefined
    const line = text.replace(/\s+/g, ' ')
    return line.length > 60 ? `${line.slice(0, 57)}...` : line
  }

  /** Follows a path as far as the document goes. */
  private walk(path: ScenePath): { node: SceneNode; offset: number; whole: boolean } {
    let node: SceneNode = this.document.contents
    let offset = 0
    for (const step of path) {
      if (isAlias(node)) node = node.resolve(this.document)
      if (isMap(node)) {
        const pair = node.items.find(({ key }) => isScalar(key) && String(key.value) === String(step))
        if (!pair) return { node, offset, whole: false }
        offset = (pair.key as Node).range?.[0] ?? offset
        node = pair.value as SceneNode
      } else if (isSeq(node)) {
        const item = node.items[Number(step)] as SceneNode
        if (!item) return { node, offset, whole: false }
        offset = item.range?.[0] ?? offset
        node = item
      } else return { node, offset, whole: false }
    }
    return { node, offset, whole: true }
  }

  private at(offset: number): SourceLocation {
    const { line, col } = this.lines.linePos(offset)
    return { file: this.file, line: Math.max(1, line), column: Math.max(1, col) }
  }

  private problemAt(offset: number, message: string): SceneProblem {
    const wording = message.includes('call stack') ? 'nested too deeply' : message
    return { location: this.at(offset), key: '', message: `not sound YAML: ${wording}` }
  }

  private unsound(offset: number, message: string): SceneError {
    return new SceneError([this.problemAt(offset, message)])
  }
}
