import { isUtf8 } from 'node:buffer';
import { exitCodes, UserError } from '../errors.js';
import type { Source } from '../records.js';

/**
 * The bytes of a source as UTF-8 without a byte-order mark. A byte-order mark (UTF-8, UTF-16) decides the encoding; without
 * one it is `encoding`, a WHATWG label, and UTF-8 where that is null.
 * @param onBytes is told the length of each piece as it is read.
 * @throws UserError exit 2 for an unknown label, exit 3 for bytes that the encoding does not allow, and for compressed ones.
 */
export async function* utf8Bytes(
  source: Source,
  encoding: string | null,
  onBytes: (bytes: number) => void = () => {},
): AsyncGenerator<Buffer> {
  const chunks = counted(source.open(), onBytes);
  try {
    let head: Buffer = Buffer.alloc(0);
    let next = await chunks.next();
    for (; !next.done && head.length < 3; next = await chunks.next())
      head = Buffer.concat([head, next.value]);
    if (head[0] === 0x1f && head[1] === 0x8b) throw compressed(source);
    const mark = byteOrderMark(head);
    const skipped = mark?.length ?? 0;
    const decode = decoderFor(source, mark?.label ?? encoding ?? 'utf-8');
    yield decode.chunk(head.subarray(skipped), skipped);
    for (; !next.done; next = await chunks.next()) yield decode.chunk(asBuffer(next.value), 0);
    yield decode.end();
  } finally {
    await chunks.return(undefined);
  }
}

async function* counted(
  chunks: AsyncIterable<Uint8Array>,
  onBytes: (bytes: number) => void,
): AsyncGenerator<Uint8Array> {
  for await (const chunk of chunks) {
    onBytes(chunk.length);
    yield chunk;
  }
}

interface Decoder {
  /** @param skipped bytes of a byte-order mark before the chunk. */
  readonly chunk: (bytes: Buffer, skipped: number) => Buffer;
  readonly end: () => Buffer;
}

function byteOrderMark(head: Buffer): { label: string; length: number } | null {
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf) return { label: 'utf-8', length: 3 };
  if (head[0] === 0xff && head[1] === 0xfe) return { label: 'utf-16le', length: 2 };
  if (head[0] === 0xfe && head[1] === 0xff) return { label: 'utf-16be', length: 2 };
  return null;
}

function decoderFor(source: Source, label: string): Decoder {
  const decoder = textDecoder(label);
  return decoder.encoding === 'utf-8' ? passUtf8(source) : decodeText(source, label, decoder);
}

/** UTF-8 in, UTF-8 out: each chunk is only checked, and cut so that no character is split. */
function passUtf8(source: Source): Decoder {
  let offset = 0;
  let rest: Buffer = Buffer.alloc(0);
  return {
    chunk(bytes, skipped) {
      offset += skipped;
      const all = rest.length === 0 ? bytes : Buffer.concat([rest, bytes]);
      const whole = all.subarray(0, all.length - unfinished(all));
      if (!isUtf8(whole)) throw invalidUtf8(source, offset + firstInvalid(whole));
      offset += whole.length;
      rest = all.subarray(whole.length);
      return whole;
    },
    end() {
      if (rest.length > 0) throw invalidUtf8(source, offset);
      return rest;
    },
  };
}

/** How many of the last bytes begin a character that the chunk does not finish, 0 to 3. */
function unfinished(bytes: Buffer): number {
  for (let back = 1; back <= Math.min(3, bytes.length); back++) {
    const byte = bytes[bytes.length - back] as number;
    if (byte < 0x80) return 0;
    if (byte >= 0xc0) return (byte >= 0xf0 ? 4 : byte >= 0xe0 ? 3 : 2) > back ? back : 0;
  }
  return 0;
}

/** Position of the first byte that is no UTF-8: decoding puts U+FFFD there, and what is before it encodes back. */
function firstInvalid(bytes: Buffer): number {
  const text = bytes.toString('utf8');
  let position = 0;
  for (let from = 0; ; ) {
    const at = text.indexOf('\ufffd', from);
    if (at < 0) return bytes.length;
    position += Buffer.byteLength(text.slice(from, at));
    if (bytes.readUIntBE(position, Math.min(3, bytes.length - position)) !== 0xefbfbd) return position;
    position += 3;
    from = at + 1;
  }
}

function decodeText(source: Source, label: string, decoder: InstanceType<typeof TextDecoder>): Decoder {
  const decode = (bytes: Uint8Array, stream: boolean) => {
    try {
      return Buffer.from(decoder.decode(bytes, { stream }));
    } catch {
      throw invalidText(source, label);
    }
  };
  return {
    chunk(bytes) {
      return decode(bytes, true);
    },
    end() {
      return decode(new Uint8Array(0), false);
    },
  };
}

function textDecoder(label: string): InstanceType<typeof TextDecoder> {
  try {
    return new TextDecoder(label, { fatal: true });
  } catch {
    throw new UserError(
      {
        code: 'unknown-encoding',
        message: `unknown encoding ${label}`,
        remedy: 'name one of the WHATWG encodings, such as windows-1252, or save the file as UTF-8',
      },
      exitCodes.unusableSettings,
    );
  }
}

function invalidUtf8(source: Source, offset: number): UserError {
  const remedy =
    'save the file as UTF-8, or name its encoding (such as windows-1252) in the setting encoding';
  const message = `invalid UTF-8 at byte offset ${offset}`;
  return new UserError({ code: 'invalid-utf8', file: source.name, message, remedy }, exitCodes.unusableInput);
}

function invalidText(source: Source, label: string): UserError {
  const message = `invalid text: some bytes are not ${label}`;
  const remedy = 'save the file as UTF-8, or correct the setting encoding';
  return new UserError(
    { code: 'invalid-encoding', file: source.name, message, remedy },
    exitCodes.unusableInput,
  );
}

function compressed(source: Source): UserError {
  const message = 'invalid text: this is gzip';
  const remedy = 'name it .gz, or unpack it before it is piped in';
  return new UserError(
    { code: 'compressed-file', file: source.name, message, remedy },
    exitCodes.unusableInput,
  );
}

function asBuffer(bytes: Uint8Array): Buffer {
  return Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
}
