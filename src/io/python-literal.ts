/** The few Python literals a .npy header is made of: a dictionary with texts, booleans, whole numbers, tuples and lists. Nothing is ever evaluated. */

export type PythonLiteral =
  | string
  | number
  | boolean
  | null
  | readonly PythonLiteral[]
  | ReadonlyMap<string, PythonLiteral>;

/** Deeper nesting than any data type has. */
const mostDepth = 32;

/** Null where the text is no such literal. */
export function parsePythonLiteral(text: string): { readonly value: PythonLiteral } | null {
  const parser = new LiteralParser(text);
  try {
    const value = parser.value(0);
    return parser.isAtEnd() ? { value } : null;
  } catch (error) {
    if (error instanceof NotALiteral) return null;
    throw error;
  }
}

class NotALiteral extends Error {}

class LiteralParser {
  private at = 0;

  constructor(private readonly text: string) {}

  isAtEnd(): boolean {
    this.skipSpace();
    return this.at === this.text.length;
  }

  value(depth: number): PythonLiteral {
    if (depth > mostDepth) throw new NotALiteral();
    this.skipSpace();
    const next = this.text[this.at];
    if (next === '{') return this.dictionary(depth);
    if (next === '(') return this.list(')', depth);
    if (next === '[') return this.list(']', depth);
    if (next === "'" || next === '"') return this.quoted(next);
    return this.word();
  }

  private dictionary(depth: number): ReadonlyMap<string, PythonLiteral> {
    const entries = new Map<string, PythonLiteral>();
    this.expect('{');
    while (!this.accept('}')) {
      const key = this.value(depth + 1);
      if (typeof key !== 'string') throw new NotALiteral();
      this.expect(':');
      entries.set(key, this.value(depth + 1));
      if (this.accept(',')) continue;
      this.expect('}');
      break;
    }
    return entries;
  }

  private list(end: ')' | ']', depth: number): readonly PythonLiteral[] {
    const items: PythonLiteral[] = [];
    this.at++;
    while (!this.accept(end)) {
      items.push(this.value(depth + 1));
      if (this.accept(',')) continue;
      this.expect(end);
      break;
    }
    return items;
  }

  private quoted(quote: string): string {
    const from = this.at + 1;
    const to = this.text.indexOf(quote, from);
    if (to < 0) throw new NotALiteral();
    this.at = to + 1;
    return this.text.slice(from, to);
  }

  /** True, False, None, or a whole number (Python 2 wrote long ones with an L). */
  private word(): number | boolean | null {
    const match = /[A-Za-z]+|-?\d{1,20}L?/y;
    match.lastIndex = this.at;
    const word = match.exec(this.text)?.[0];
    if (word === undefined) throw new NotALiteral();
    this.at += word.length;
    if (word === 'True' || word === 'False') return word === 'True';
    if (word === 'None') return null;
    if (/^[A-Za-z]/.test(word)) throw new NotALiteral();
    return Number(word.replace('L', ''));
  }

  private expect(sign: string): void {
    if (!this.accept(sign)) throw new NotALiteral();
  }

  private accept(sign: string): boolean {
    this.skipSpace();
    if (this.text[this.at] !== sign) return false;
    this.at++;
    return true;
  }

  private skipSpace(): void {
    while (/\s/.test(this.text[this.at] ?? '')) this.at++;
  }
}
