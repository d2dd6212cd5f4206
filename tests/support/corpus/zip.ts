import { crc32, deflateRawSync } from "node:zlib";

/** A part of an archive; its sizes can be made to lie. */
export type Part = {
  name: string;
  content: string | Buffer;
  /** What the archive says of the unpacked size. */
  declaredSize?: number;
  isEncrypted?: boolean;
};

function local(part: Required<Pick<Part, "name" | "isEncrypted">> & { packed: Buffer; size: number; crc: number }) {
  const name = Buffer.from(part.name);
  const head = Buffer.alloc(30);
  head.writeUInt32LE(0x04034b50, 0);
  head.writeUInt16LE(20, 4);
  head.writeUInt16LE(part.isEncrypted ? 1 : 0, 6);
  head.writeUInt16LE(8, 8);
  head.writeUInt32LE(part.crc, 14);
  head.writeUInt32LE(part.packed.length, 18);
  head.writeUInt32LE(part.size, 22);
  head.writeUInt16LE(name.length, 26);
  return Buffer.concat([head, name, part.packed]);
}

function central(
  part: { name: string; isEncrypted: boolean; packed: Buffer; size: number; crc: number },
  offset: number,
) {
  const name = Buffer.from(part.name);
  const head = Buffer.alloc(46);
  head.writeUInt32LE(0x02014b50, 0);
  head.writeUInt16LE(20, 4);
  head.writeUInt16LE(20, 6);
  head.writeUInt16LE(part.isEncrypted ? 1 : 0, 8);
  head.writeUInt16LE(8, 10);
  head.writeUInt32LE(part.crc, 16);
  head.writeUInt32LE(part.packed.length, 20);
  head.writeUInt32LE(part.size, 24);
  head.writeUInt16LE(name.length, 28);
  head.writeUInt32LE(offset, 42);
  return Buffer.concat([head, name]);
}

/** An archive byte by byte, so that it can also be a wrong one. */
export function zip(parts: readonly Part[]): Buffer {
  const locals: Buffer[] = [];
  const centrals: Buffer[] = [];
  let offset = 0;
  for (const { name, content, declaredSize, isEncrypted = false } of parts) {
    const bytes = Buffer.from(content as Buffer);
    const packed = deflateRawSync(bytes, { level: 9 });
    const part = { name, isEncrypted, packed, size: declaredSize ?? bytes.length, crc: crc32(bytes) };
    const written = local(part);
    centrals.push(central(part, offset));
    locals.push(written);
    offset += written.length;
  }
  const directory = Buffer.concat(centrals);
  const end = Buffer.alloc(22);
  end.writeUInt32LE(0x06054b50, 0);
  end.writeUInt16LE(parts.length, 8);
  end.writeUInt16LE(parts.length, 10);
  end.writeUInt32LE(directory.length, 12);
  end.writeUInt32LE(offset, 16);
  return Buffer.concat([...locals, directory, end]);
}
