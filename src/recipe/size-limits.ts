/**
 * Looks over a value before it is validated: whether it is made of plain JSON values and small enough
 * for a recipe, so that validation cannot hang or fill the memory with problems.
 */
import { deepestNesting } from './json-text';
import { type PathParts, type RecipeProblem, statedProblem, wrongValue } from './problems';

/** Lists of numbers that may be as long as a scan asks for: axis values and masks. */
const longLists: readonly RegExp[] = [/^scan\/axis\/values$/, /^regions\/\d+\/rle$/];
const longestList = 10_000;
const mostFields = 1_000;
/** Values in all, without the long lists of numbers. */
const mostValues = 200_000;

/** What makes the value no candidate for a recipe at all; empty when it may be validated. */
export function sizeProblems(value: unknown): readonly RecipeProblem[] {
  return new Survey().look(value);
}

class Survey {
  readonly #problems: RecipeProblem[] = [];
  readonly #path: (string | number)[] = [];
  readonly #above = new Set<object>();
  #values = 0;

  look(value: unknown): readonly RecipeProblem[] {
    this.#visit(value);
    return this.#problems;
  }

  #visit(value: unknown): void {
    if (this.#problems.length > 0) return;
    this.#values++;
    if (this.#values > mostValues) this.#tell(`there are more than ${mostValues} values`, []);
    else if (typeof value === 'object' && value !== null) this.#visitInside(value);
    else if (!isPlainValue(value)) this.#tell(`a ${typeof value} is no JSON value`);
  }

  #visitInside(value: object): void {
    if (this.#above.has(value)) this.#tell('it contains itself');
    else if (this.#path.length > deepestNesting) {
      this.#tell(`it is nested deeper than ${deepestNesting} levels`, []);
    } else {
      this.#above.add(value);
      if (Array.isArray(value)) this.#visitList(value);
      else this.#visitObject(value);
      this.#above.delete(value);
    }
  }

  #visitList(list: readonly unknown[]): void {
    if (list.length <= longestList) {
      for (const [index, entry] of list.entries()) this.#descend(index, entry);
    } else if (this.#isLongList()) this.#visitNumbers(list);
    else this.#tell(`the list has ${list.length} entries, at most ${longestList} are allowed`);
  }

  #isLongList(): boolean {
    const path = this.#path.join('/');
    return longLists.some((pattern) => pattern.test(path));
  }

  #visitNumbers(list: readonly unknown[]): void {
    const index = list.findIndex((entry) => typeof entry !== 'number' || !Number.isFinite(entry));
    if (index < 0) return;
    const path = [...this.#path, index];
    this.#problems.push(wrongValue({ path, value: list[index], expected: 'a number' }));
  }

  #visitObject(object: object): void {
    const prototype: unknown = Object.getPrototypeOf(object);
    const entries = Object.entries(object);
    if (prototype !== null && prototype !== Object.prototype) this.#tell('it is no plain object');
    else if (entries.length > mostFields) {
      this.#tell(`the object has ${entries.length} fields, at most ${mostFields} are allowed`);
    } else for (const [key, entry] of entries) this.#descend(key, entry);
  }

  #descend(key: string | number, entry: unknown): void {
    this.#path.push(key);
    this.#visit(entry);
    this.#path.pop();
  }

  #tell(message: string, path: PathParts = [...this.#path]): void {
    this.#problems.push(
      statedProblem({ path, value: null, expected: 'a recipe of reasonable size', message }),
    );
  }
}

/** A field given as undefined is told where its schema is known: it is missing, or must be left out. */
function isPlainValue(value: unknown): boolean {
  return value === null || ['undefined', 'boolean', 'number', 'string'].includes(typeof value);
}
