import fs from "node:fs";
import path from "node:path";

export type SinkEntry = { id: number; at: string; from: string; to: string; messageId: string; size: number };
export type SinkStore = {
  add(message: { from: string; to: string; raw: Buffer }): SinkEntry;
  /** Oldest first. */
  entries(): readonly SinkEntry[];
  raw(id: number): Buffer | null;
  close(): void;
};

/** Without a folder the newest of these stay in memory, as long as they take less than this. */
const MEMORY_BYTES = 256 * 1024 * 1024;

/** Keeps mail in `messages.ndjson` of a folder, one line each, or in memory. What a folder holds is found again. */
export function openStore(folder: string | null): SinkStore {
  return folder === null ? inMemory() : inFolder(folder);
}

const entryOf = (id: number, at: string, { from, to, raw }: { from: string; to: string; raw: Buffer }): SinkEntry => ({
  id,
  at,
  from,
  to,
  messageId: /^message-id:\s*(<[^>]*>)/im.exec(raw.subarray(0, 8192).toString("latin1"))?.[1] ?? "",
  size: raw.length,
});

function inMemory(): SinkStore {
  const kept: { entry: SinkEntry; raw: Buffer }[] = [];
  let bytes = 0;
  let last = 0;
  return {
    add(message) {
      last += 1;
      const entry = entryOf(last, new Date().toISOString(), message);
      kept.push({ entry, raw: message.raw });
      bytes += message.raw.length;
      while (bytes > MEMORY_BYTES && kept.length > 1) bytes -= kept.shift()?.raw.length ?? 0;
      return entry;
    },
    entries: () => kept.map(({ entry }) => entry),
    raw: (id) => kept.find(({ entry }) => entry.id === id)?.raw ?? null,
    close: () => {},
  };
}

function inFolder(folder: string): SinkStore {
  fs.mkdirSync(folder, { recursive: true });
  const file = fs.openSync(path.join(folder, "messages.ndjson"), "a+");
  const entries: SinkEntry[] = [];
  const places = new Map<number, { offset: number; length: number }>();
  let end = 0;
  const keep = (entry: SinkEntry, length: number) => {
    entries.push(entry);
    places.set(entry.id, { offset: end, length });
    end += length + 1;
  };
  const line = (offset: number, length: number): { id: number; at: string; from: string; to: string; raw: string } => {
    const bytes = Buffer.alloc(length);
    fs.readSync(file, bytes, 0, length, offset);
    return JSON.parse(bytes.toString("utf8"));
  };
  for (const text of readLines(file)) {
    const { id, at, from, to, raw } = JSON.parse(text) as ReturnType<typeof line>;
    keep(entryOf(id, at, { from, to, raw: Buffer.from(raw, "base64") }), Buffer.byteLength(text));
  }
  // A line that a crash cut short is dropped.
  fs.ftruncateSync(file, end);
  return {
    add(message) {
      const entry = entryOf((entries.at(-1)?.id ?? 0) + 1, new Date().toISOString(), message);
      const { id, at, from, to } = entry;
      const bytes = Buffer.from(JSON.stringify({ id, at, from, to, raw: message.raw.toString("base64") }));
      fs.writeSync(file, Buffer.concat([bytes, Buffer.from("\n")]));
      keep(entry, bytes.length);
      return entry;
    },
    entries: () => entries,
    raw(id) {
      const place = places.get(id);
      return place ? Buffer.from(line(place.offset, place.length).raw, "base64") : null;
    },
    close: () => fs.closeSync(file),
  };
}

function* readLines(file: number): Generator<string> {
  const chunk = Buffer.alloc(1 << 20);
  let rest = Buffer.alloc(0);
  for (let offset = 0; ; ) {
    const got = fs.readSync(file, chunk, 0, chunk.length, offset);
    if (got === 0) return;
    offset += got;
    rest = Buffer.concat([rest, chunk.subarray(0, got)]);
    for (let at = rest.indexOf(10); at >= 0; at = rest.indexOf(10)) {
      yield rest.subarray(0, at).toString("utf8");
      rest = rest.subarray(at + 1);
    }
  }
}
