/**
 * The bytes of one zip member by range. A stored member is read where it lies. A deflated one is
 * unpacked as a stream from its beginning, keeping only what is asked for; asking onwards continues the
 * stream, so reading a member block by block unpacks it once.
 */
import { Inflate } from 'fflate';
import { readExactly } from '../byte-source';
import type { ByteSource } from '../container';
import { asScanError, scanError } from '../scan-error';
import type { ReadRange } from '../stored-array';
import { Crc32 } from './crc32';
import type { ZipMember } from './zip-directory';

/** Packed bytes unpacked in one step: at most 16 MB come out, since deflate gives at most 1032 for one. */
const stepBytes = 16 << 10;
const mostRatio = 1032;
const bombBytes = 2 ** 30;
const bombRatio = 100;

/** @throws RimlightError 'scan' - when the member is encrypted, packed by an unknown method, or damaged */
export async function openMember(source: ByteSource, member: ZipMember): Promise<ReadRange> {
  const where = `${source.name}: ${member.name}`;
  assertReadable(member, where);
  const dataAt = await findData(source, member, where);
  const read: ReadRange = async (from, to) => {
    if (to > member.bytes) throw tooShort(member, to, where);
    return readExactly(source, dataAt + from, dataAt + to, where);
  };
  if (member.method === 0) return read;
  return new UnpackedStream(source, member, dataAt, where).read;
}

function assertReadable(member: ZipMember, where: string): void {
  const { method, isEncrypted, bytes, packedBytes } = member;
  if (isEncrypted) {
    throw scanError(
      'the member is encrypted',
      where,
      'Unpack the archive with its password first.',
    );
  }
  if (method !== 0 && method !== 8) {
    throw scanError(
      `the member is packed by method ${method}; only stored (0) and deflated (8) ones can be read`,
      where,
      'Write the archive again with numpy.savez or numpy.savez_compressed.',
    );
  }
  if (method === 0 && bytes !== packedBytes) throw scanError('its sizes do not agree', where);
  const isImpossible = bytes > packedBytes * mostRatio + 1024;
  const isBomb = bytes > bombBytes && bytes > packedBytes * bombRatio;
  if (method === 8 && (isImpossible || isBomb)) {
    throw scanError(
      `${packedBytes} bytes claim to unpack to ${bytes}, which no measured scan does`,
      where,
      'If it is meant, write it with numpy.savez instead of numpy.savez_compressed.',
    );
  }
}

/** The local header's own name and extra field decide where the data begin. */
async function findData(source: ByteSource, member: ZipMember, where: string): Promise<number> {
  const { headerAt, packedBytes } = member;
  const header = await readExactly(source, headerAt, headerAt + 30, where);
  const view = new DataView(header.buffer, header.byteOffset, header.byteLength);
  if (view.getUint32(0, true) !== 0x04034b50 || view.getUint16(8, true) !== member.method) {
    throw scanError('its header is damaged', `${where}, byte ${headerAt}`);
  }
  const dataAt = headerAt + 30 + view.getUint16(26, true) + view.getUint16(28, true);
  if (dataAt + packedBytes > source.size) {
    throw scanError(
      `the file ends at byte ${source.size}, inside the member`,
      where,
      'It was cut off: copy it again, or repeat the export.',
    );
  }
  return dataAt;
}

class UnpackedStream {
  private inflate = new Inflate();
  /** unpacked bytes not yet passed over, of which the first is byte `at` */
  private pieces: Uint8Array[] = [];
  private at = 0;
  private held = 0;
  private packedDone = 0;
  private crc = new Crc32();
  private isBusy = false;

  constructor(
    private readonly source: ByteSource,
    private readonly member: ZipMember,
    private readonly dataAt: number,
    private readonly where: string,
  ) {
    this.restart();
  }

  readonly read: ReadRange = async (from, to) => {
    if (this.isBusy) {
      // Two readers of one stream would take each other's bytes: the second gets its own.
      return new UnpackedStream(this.source, this.member, this.dataAt, this.where).read(from, to);
    }
    this.isBusy = true;
    try {
      return await this.readAlone(from, to);
    } finally {
      this.isBusy = false;
    }
  };

  private async readAlone(from: number, to: number): Promise<Uint8Array> {
    const { member, where } = this;
    if (to > member.bytes) throw tooShort(member, to, where);
    if (from < this.at) this.restart();
    const out = new Uint8Array(to - from);
    let done = 0;
    this.passOver(from);
    while (done < out.length) {
      if (this.held === 0) await this.step();
      this.passOver(from + done);
      const piece = this.pieces[0];
      if (piece === undefined) continue;
      const take = Math.min(piece.length, out.length - done);
      out.set(piece.subarray(0, take), done);
      done += take;
      this.passOver(from + done);
    }
    if (to === member.bytes) await this.finish();
    return out;
  }

  private restart(): void {
    this.pieces = [];
    this.at = 0;
    this.held = 0;
    this.packedDone = 0;
    this.crc = new Crc32();
    this.inflate = new Inflate((piece) => {
      if (piece.length === 0) return;
      this.crc.add(piece);
      this.pieces.push(piece);
      this.held += piece.length;
      if (this.at + this.held > this.member.bytes) {
        throw scanError('it unpacks to more than it claims', this.where);
      }
    });
  }

  /** Drops held bytes before `from`. */
  private passOver(from: number): void {
    while (this.at < from && this.pieces.length > 0) {
      const piece = this.pieces[0];
      const drop = Math.min(piece.length, from - this.at);
      if (drop === piece.length) this.pieces.shift();
      else this.pieces[0] = piece.subarray(drop);
      this.at += drop;
      this.held -= drop;
    }
  }

  private async step(): Promise<void> {
    const { packedBytes } = this.member;
    const take = Math.min(stepBytes, packedBytes - this.packedDone);
    if (take <= 0) throw scanError('it unpacks to less than it claims', this.where);
    const from = this.dataAt + this.packedDone;
    const packed = await readExactly(this.source, from, from + take, this.where);
    this.packedDone += take;
    try {
      this.inflate.push(packed, this.packedDone === packedBytes);
    } catch (error) {
      throw asScanError(error, 'the packed data are damaged', `${this.where}, byte ${from}`);
    }
  }

  /** At the end the checksum tells whether all was unpacked as it was packed. */
  private async finish(): Promise<void> {
    while (this.packedDone < this.member.packedBytes) await this.step();
    if (this.crc.value() !== this.member.crc32) {
      throw scanError('its checksum does not agree with its data', this.where);
    }
  }
}

function tooShort({ bytes }: ZipMember, needed: number, where: string) {
  return scanError(`it holds ${bytes} bytes where at least ${needed} are needed`, where);
}
