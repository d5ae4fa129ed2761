import { SaxesParser } from "saxes";
import { printCount } from "../../../../shared/tables/numbers.ts";
import { Refusal } from "../../refusal.ts";

/** Told of tags as they come; names without their prefix. */
export interface TagSink {
  open(name: string, attributes: Readonly<Record<string, string>>): void;
  text?(text: string): void;
  close?(name: string): void;
}

/** Signs without a tag between them: a cell has at most 32,767. */
const LONGEST_TEXT = 1_000_000;
/** Thrown by a sink that has seen enough. */
export const ENOUGH = Symbol("enough");

const local = (name: string) => (name.includes(":") ? name.slice(name.indexOf(":") + 1) : name);

/**
 * Reads the tags of an XML part as its bytes come. Entities of its own are refused by the reader beneath, so that none
 * can unfold; a text or tag without end is refused before it fills the memory.
 */
export async function readTags(bytes: AsyncIterable<Uint8Array>, part: string, sink: TagSink): Promise<void> {
  const parser = new SaxesParser({ position: false });
  parser.on("error", (error) => {
    throw new Refusal(
      `The workbook's part ${part} cannot be read: ${error.message.replace(/^undefined:|^\d+:\d+: /, "")}.`,
    );
  });
  parser.on("opentag", ({ name, attributes }) => sink.open(local(name), attributes as Record<string, string>));
  if (sink.text) parser.on("text", (text) => sink.text?.(text));
  if (sink.close) parser.on("closetag", ({ name }) => sink.close?.(local(name)));
  const decoder = new TextDecoder("utf-8", { fatal: true });
  let unbroken = 0;
  try {
    for await (const piece of bytes) {
      const text = decoder.decode(piece, { stream: true });
      const last = Math.max(text.lastIndexOf("<"), text.lastIndexOf(">"));
      unbroken = last < 0 ? unbroken + text.length : text.length - last;
      if (unbroken > LONGEST_TEXT) {
        throw new Refusal(`The workbook's part ${part} has more than ${printCount(LONGEST_TEXT)} signs without a tag.`);
      }
      parser.write(text);
    }
    parser.close();
  } catch (error) {
    if (error === ENOUGH) return;
    if (error instanceof TypeError) throw new Refusal(`The workbook's part ${part} is not text in UTF-8.`);
    throw error;
  }
}
