/**
 * JCAMP-DX text as labelled data records in blocks: "##LABEL= value", comments after $$, blocks from
 * ##TITLE= to ##END=, which a LINK block holds inside itself.
 *
 * @see R. S. McDonald, P. A. Wilks, Appl. Spectrosc. 42, 151 (1988), JCAMP-DX 4.24
 */

export interface RecordLine {
  /** without comment */
  readonly text: string;
  /** counted from 1 */
  readonly number: number;
}

export interface JcampRecord {
  /** capitals without the blanks, dashes, slashes and underlines that do not count: "DATATYPE" */
  readonly label: string;
  /** as written: "DATA TYPE" */
  readonly name: string;
  /** text after the equals sign, on its own line */
  readonly value: string;
  /** the lines below, to the next label, without blank ones */
  readonly lines: readonly RecordLine[];
  /** line of the label, counted from 1 */
  readonly number: number;
}

export interface JcampBlock {
  readonly records: readonly JcampRecord[];
  /** whether ##END= closes it */
  readonly isEnded: boolean;
}

interface OpenBlock {
  readonly records: JcampRecord[];
  isEnded: boolean;
}

/** All blocks in the order they begin, those inside a LINK block after it. */
export function readBlocks(text: string): readonly JcampBlock[] {
  const blocks: OpenBlock[] = [];
  const open: OpenBlock[] = [];
  for (const record of readRecords(text)) {
    if (record.label === 'TITLE' || open.length === 0) {
      const block = { records: [], isEnded: false };
      blocks.push(block);
      open.push(block);
    }
    const block = open[open.length - 1];
    if (record.label === 'END') {
      block.isEnded = true;
      open.pop();
    } else {
      block.records.push(record);
    }
  }
  return blocks;
}

function readRecords(text: string): readonly JcampRecord[] {
  const records: JcampRecord[] = [];
  let lines: RecordLine[] = [];
  text.split('\n').forEach((whole, index) => {
    const line = withoutComment(whole);
    const match = /^\s*##([^=]*)=(.*)$/.exec(line);
    if (match !== null) {
      lines = [];
      records.push({
        label: labelOf(match[1]),
        name: match[1].trim(),
        value: match[2].trim(),
        lines,
        number: index + 1,
      });
    } else if (line.trim() !== '') {
      lines.push({ text: line, number: index + 1 });
    }
  });
  return records;
}

function withoutComment(line: string): string {
  const at = line.indexOf('$$');
  return at < 0 ? line : line.slice(0, at);
}

function labelOf(name: string): string {
  return name.toUpperCase().replace(/[\s\-/_]/g, '');
}

/** The first record of a label; undefined without one. */
export function recordOf(block: JcampBlock, label: string): JcampRecord | undefined {
  return block.records.find((record) => record.label === label);
}

/** The text of a record, "" without one. */
export function textOf(block: JcampBlock, label: string): string {
  return recordOf(block, label)?.value ?? '';
}

/** The number of a record; null without one, or where it is none. */
export function numberOf(block: JcampBlock, label: string): number | null {
  const match = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/.exec(textOf(block, label));
  if (match === null) return null;
  const value = Number(match[0]);
  return Number.isFinite(value) ? value : null;
}
