/**
 * JSON text into a value, strictly, with the place of every value. The language's own reader keeps
 * the last of two equal keys without a word and words its errors differently in each engine.
 */
import { formatPath, type RecipeProblem, statedProblem, type TextPosition } from './problems';

/** Deeper than any recipe; a deeper one is refused before it costs anything. */
export const deepestNesting = 32;
/** 8 MB: a mask of a 1024 × 1024 scan at its worst. */
export const longestText = 8 * 2 ** 20;

export type JsonResult =
  | {
      readonly ok: true;
      readonly value: unknown;
      /** keys that stand twice in one object */
      readonly problems: readonly RecipeProblem[];
      positionOf(path: string): TextPosition | null;
    }
  | { readonly ok: false; readonly problem: RecipeProblem };

/** Thrown inside only: the first place where the text is no JSON. */
class TextFault extends Error {
  readonly offset: number;
  readonly expected: string;
  constructor(message: string, offset: number, expected: string) {
    super(message);
    this.offset = offset;
    this.expected = expected;
  }
}

/** Reads text as JSON (RFC 8259); a byte order mark at its start is passed over. */
export function parseJsonText(text: string): JsonResult {
  if (text.length > longestText) {
    const megabytes = Math.round(text.length / 2 ** 20);
    return {
      ok: false,
      problem: documentProblem(
        `the text is ${megabytes} MB long; a recipe has at most ${longestText / 2 ** 20} MB`,
        'a recipe',
      ),
    };
  }
  const reader = new JsonReader(text);
  try {
    const value = reader.readDocument();
    return {
      ok: true,
      value,
      problems: reader.problems,
      positionOf: (path) => {
        const offset = reader.offsets.get(path);
        return offset === undefined ? null : positionAt(text, offset);
      },
    };
  } catch (fault) {
    if (!(fault instanceof TextFault)) throw fault;
    const position = positionAt(text, fault.offset);
    const problem = documentProblem(`this is no valid JSON: ${fault.message}`, fault.expected);
    return { ok: false, problem: { ...problem, position } };
  }
}

function documentProblem(message: string, expected: string): RecipeProblem {
  return statedProblem({ path: [], value: null, expected, message });
}

/** Line and column, from 1, columns in characters. */
function positionAt(text: string, offset: number): TextPosition {
  let line = 1;
  let start = 0;
  for (let end = text.indexOf('\n'); end >= 0 && end < offset; end = text.indexOf('\n', start)) {
    line++;
    start = end + 1;
  }
  return { line, column: offset - start + 1 };
}

const numberPattern = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const wordPattern = /[A-Za-z0-9_$.+-]+/y;
/** More places than any recipe has fields; the rest go without a line number. */
const mostOffsets = 100_000;

class JsonReader {
  readonly offsets = new Map<string, number>();
  readonly problems: RecipeProblem[] = [];
  readonly #text: string;
  #at = 0;
  #path: (string | number)[] = [];

  constructor(text: string) {
    this.#text = text;
    if (text.startsWith('\uFEFF')) this.#at = 1;
  }

  readDocument(): unknown {
    this.#skipBlanks();
    if (this.#at >= this.#text.length) throw this.#fault('the text is empty', 'an object { … }');
    const value = this.#readValue();
    this.#skipBlanks();
    if (this.#at < this.#text.length) {
      throw this.#fault(`${this.#here()} follows the end of the document`, 'the end of the text');
    }
    return value;
  }

  #readValue(): unknown {
    const first = this.#text[this.#at];
    this.#keepOffset(first);
    if (first === '{') return this.#readObject();
    if (first === '[') return this.#readArray();
    if (first === '"') return this.#readString();
    return this.#readNumberOrWord();
  }

  /** Single numbers of lists are not worth a place: an axis has thousands. */
  #keepOffset(first: string | undefined): void {
    const isEntry = typeof this.#path.at(-1) === 'number';
    if (isEntry && first !== '{' && first !== '[' && first !== '"') return;
    if (this.offsets.size < mostOffsets) this.offsets.set(formatPath(this.#path), this.#at);
  }

  #readObject(): Record<string, unknown> {
    this.#enter();
    const object: Record<string, unknown> = {};
    for (let isFirst = true; !this.#ends('}', isFirst); isFirst = false) {
      const keyAt = this.#at;
      if (this.#text[keyAt] !== '"') {
        throw this.#fault(
          `a field name in double quotes was expected, not ${this.#here()}`,
          'a field name in double quotes',
        );
      }
      const key = this.#readString();
      this.#skipBlanks();
      if (this.#text[this.#at] !== ':') {
        throw this.#fault(`a colon was expected after "${key}", not ${this.#here()}`, 'a colon');
      }
      this.#at++;
      this.#skipBlanks();
      this.#path.push(key);
      if (Object.hasOwn(object, key)) this.#tellDuplicate(key, keyAt);
      const value = this.#readValue();
      this.#path.pop();
      // Defined, not assigned: "__proto__" is a field name like any other here.
      Object.defineProperty(object, key, {
        value,
        writable: true,
        enumerable: true,
        configurable: true,
      });
    }
    this.#at++;
    return object;
  }

  #tellDuplicate(key: string, keyAt: number): void {
    const problem = statedProblem({
      path: this.#path,
      value: key,
      expected: 'each field once',
      message: `"${key}" stands twice in the same object`,
    });
    this.problems.push({ ...problem, position: positionAt(this.#text, keyAt) });
  }

  #readArray(): unknown[] {
    this.#enter();
    const list: unknown[] = [];
    for (let isFirst = true; !this.#ends(']', isFirst); isFirst = false) {
      this.#path.push(list.length);
      list.push(this.#readValue());
      this.#path.pop();
    }
    this.#at++;
    return list;
  }

  #enter(): void {
    if (this.#path.length >= deepestNesting) {
      throw this.#fault(`it is nested deeper than ${deepestNesting} levels`, 'a recipe');
    }
    this.#at++;
  }

  /** Stands after the last entry, or after the comma before the next. */
  #ends(closer: '}' | ']', isFirst: boolean): boolean {
    this.#skipBlanks();
    if (this.#text[this.#at] === closer) return true;
    if (isFirst) return false;
    if (this.#text[this.#at] !== ',') {
      throw this.#fault(
        `a comma or "${closer}" was expected, not ${this.#here()}`,
        `a comma or "${closer}"`,
      );
    }
    this.#at++;
    this.#skipBlanks();
    if (this.#text[this.#at] === closer) {
      throw this.#fault(`a comma stands before "${closer}"`, `no comma before "${closer}"`);
    }
    return false;
  }

  #readString(): string {
    const from = this.#at;
    let hasEscapes = false;
    for (let at = from + 1; at < this.#text.length; at++) {
      const code = this.#text.charCodeAt(at);
      if (code === 0x22) {
        this.#at = at + 1;
        return hasEscapes ? this.#unescape(from) : this.#text.slice(from + 1, at);
      }
      if (code === 0x5c) {
        hasEscapes = true;
        at++;
      } else if (code < 0x20) {
        this.#at = at;
        throw this.#fault(
          'text in quotes runs over the end of its line, or holds a control character',
          'a closing quote',
        );
      }
    }
    throw this.#fault('a closing quote is missing', 'a closing quote');
  }

  #unescape(from: number): string {
    try {
      return JSON.parse(this.#text.slice(from, this.#at)) as string;
    } catch {
      this.#at = from;
      throw this.#fault(
        'text in quotes holds a backslash that begins no escape',
        'an escape such as \\\\ or \\u00b5',
      );
    }
  }

  #readNumberOrWord(): unknown {
    numberPattern.lastIndex = this.#at;
    wordPattern.lastIndex = this.#at;
    const number = numberPattern.exec(this.#text)?.[0] ?? '';
    const word = wordPattern.exec(this.#text)?.[0] ?? '';
    if (word !== '' && number === word) {
      this.#at += word.length;
      return Number(word);
    }
    const constant = constants.get(word);
    if (constant === undefined) {
      throw this.#fault(
        `a value was expected, not ${this.#here()}`,
        'text in double quotes, a number, true, false, null, { … } or [ … ]',
      );
    }
    this.#at += word.length;
    return constant;
  }

  #skipBlanks(): void {
    let code = this.#text.charCodeAt(this.#at);
    while (code === 0x20 || code === 0x0a || code === 0x0d || code === 0x09) {
      code = this.#text.charCodeAt(++this.#at);
    }
  }

  /** What stands at the present place, for a message. */
  #here(): string {
    const rest = this.#text.slice(this.#at, this.#at + 24);
    if (rest === '') return 'the end of the text';
    if (rest.startsWith('//') || rest.startsWith('/*')) return 'a comment (JSON has none)';
    if (rest.startsWith("'")) return 'a single quote';
    wordPattern.lastIndex = 0;
    const word = wordPattern.exec(rest)?.[0];
    return JSON.stringify(word ?? String.fromCodePoint(rest.codePointAt(0) ?? 0));
  }

  #fault(message: string, expected: string): TextFault {
    return new TextFault(message, this.#at, expected);
  }
}

const constants: ReadonlyMap<string, boolean | null> = new Map([
  ['true', true],
  ['false', false],
  ['null', null],
]);
