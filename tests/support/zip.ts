import { crc32, deflateRawSync } from "node:zlib";

export interface ZipPart {
  readonly name: string;
  readonly bytes: string | Uint8Array;
  /** What the archive claims it has unpacked, when that is not so. */
  readonly claimed?: number;
}

/** A zip archive written out by hand, so that it can be wrong in ways no writer of archives is. */
export function zipOf(parts: readonly ZipPart[]): Uint8Array {
  const bodies: Buffer[] = [];
  const directory: Buffer[] = [];
  let at = 0;
  for (const { name, bytes, claimed } of parts) {
    const content = Buffer.from(bytes);
    const packed = deflateRawSync(content);
    const fields = Buffer.alloc(26);
    fields.writeUInt16LE(20, 0);
    fields.writeUInt16LE(8, 4);
    fields.writeUInt32LE(crc32?.(content) ?? 0, 10);
    fields.writeUInt32LE(packed.length, 14);
    fields.writeUInt32LE(claimed ?? content.length, 18);
    fields.writeUInt16LE(Buffer.byteLength(name), 22);
    const local = Buffer.concat([Buffer.from([0x50, 0x4b, 3, 4]), fields, Buffer.from(name), packed]);
    const rest = Buffer.alloc(14);
    rest.writeUInt32LE(at, 10);
    directory.push(Buffer.concat([Buffer.from([0x50, 0x4b, 1, 2, 20, 0]), fields, rest, Buffer.from(name)]));
    bodies.push(local);
    at += local.length;
  }
  const list = Buffer.concat(directory);
  const end = Buffer.alloc(22);
  end.writeUInt32LE(0x06054b50, 0);
  end.writeUInt16LE(parts.length, 8);
  end.writeUInt16LE(parts.length, 10);
  end.writeUInt32LE(list.length, 12);
  end.writeUInt32LE(at, 16);
  return new Uint8Array(Buffer.concat([...bodies, list, end]));
}

const RELATIONS = "http://schemas.openxmlformats.org/officeDocument/2006/relationships";

interface SheetXml {
  readonly name?: string;
  /** Within `<worksheet>`: `<sheetData>…</sheetData>` and what follows it. */
  readonly xml: string;
}

/** The parts of a workbook around sheets written out as XML. */
export function workbookParts(sheets: readonly SheetXml[], more: readonly ZipPart[] = []): ZipPart[] {
  const named = sheets.map(
    ({ name = "Rows" }, at) => `<sheet name="${name}" sheetId="${at + 1}" r:id="rId${at + 1}"/>`,
  );
  const related = sheets.map(
    (_, at) => `<Relationship Id="rId${at + 1}" Type="${RELATIONS}/worksheet" Target="worksheets/sheet${at + 1}.xml"/>`,
  );
  return [
    {
      name: "xl/workbook.xml",
      bytes: `<?xml version="1.0"?><workbook xmlns:r="${RELATIONS}"><sheets>${named.join("")}</sheets></workbook>`,
    },
    { name: "xl/_rels/workbook.xml.rels", bytes: `<Relationships>${related.join("")}</Relationships>` },
    ...sheets.map(({ xml }, at) => ({
      name: `xl/worksheets/sheet${at + 1}.xml`,
      bytes: `<worksheet>${xml}</worksheet>`,
    })),
    ...more,
  ];
}
