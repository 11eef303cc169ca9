/** The parts that the tests use of the W3C's parser and validator, which comes without types. */
declare module 'webvtt-parser' {
  interface ParsedNode {
    type?: 'text' | 'object' | 'timestamp'
    /** Of a text, a string. */
    value?: string | number
    children?: ParsedNode[]
  }
  interface ParsedCue {
    id: string
    /** Seconds. */
    startTime: number
    endTime: number
    linePosition: number | 'auto'
    textPosition: number | 'auto'
    alignment: string
    /** As written. */
    text: string
    tree: ParsedNode
  }
  interface Parsed {
    /** By start, the longer first. */
    cues: ParsedCue[]
    errors: { message: string; line: number; col?: number }[]
  }
  interface Parser {
    parse(text: string, mode: 'captions' | 'chapters' | 'metadata'): Parsed
  }
  const parser: {
    /** `references`: characters by their references, such as `&amp;`. */
    WebVTTParser: new (references: Readonly<Record<string, string>>) => Parser
  }
  export default parser
}
