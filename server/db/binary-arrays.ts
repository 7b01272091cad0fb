/** Elements of an array parameter; null and left out are NULL. */
type Elements<T> = readonly (T | null | undefined)[];

// Types by their numbers in pg_type, which never change.
const TYPE = { bytea: 17, int2: 21, int4: 23, text: 25, float4: 700, uuid: 2950 } as const;

/**
 * An array as PostgreSQL takes it in binary form (array_recv): the driver sends a Buffer as it is,
 * so thousands of values reach the server without being quoted here or parsed there. The parameter
 * needs the cast that goes with it, such as `$1::uuid[]`.
 */
function pack<T>(
  type: number,
  values: Elements<T>,
  size: (value: T) => number,
  write: (out: Buffer, at: number, value: T) => void,
): Buffer {
  if (values.length === 0) {
    const empty = Buffer.alloc(12);
    empty.writeInt32BE(type, 8);
    return empty;
  }
  let bytes = 20;
  let nulls = 0;
  for (const value of values) {
    bytes += 4;
    if (value == null) nulls = 1;
    else bytes += size(value);
  }
  const out = Buffer.allocUnsafe(bytes);
  out.writeInt32BE(1, 0);
  out.writeInt32BE(nulls, 4);
  out.writeInt32BE(type, 8);
  out.writeInt32BE(values.length, 12);
  out.writeInt32BE(1, 16);
  let at = 20;
  for (const value of values) {
    const length = value == null ? -1 : size(value);
    at = out.writeInt32BE(length, at);
    if (value == null) continue;
    write(out, at, value);
    at += length;
  }
  return out;
}

const fixed = (length: number) => () => length;

/** What a character of an id stands for: 0 to 15, or 255. */
const NIBBLES = new Uint8Array(128).fill(255);
for (let value = 0; value < 16; value++) {
  const digit = value.toString(16);
  NIBBLES[digit.charCodeAt(0)] = value;
  NIBBLES[digit.toUpperCase().charCodeAt(0)] = value;
}
const DASH = 45;

// By hand: an import writes millions of ids, and taking their dashes out makes a text for each.
function writeId(out: Buffer, at: number, id: string): void {
  let digits = 0;
  let high = 0;
  for (let k = 0; k < id.length; k++) {
    const character = id.charCodeAt(k);
    if (character === DASH) continue;
    const value = NIBBLES[character] ?? 255;
    if (value === 255 || digits === 32) throw new Error("not an id");
    if (digits % 2 === 0) high = value;
    else out[at + (digits >> 1)] = (high << 4) | value;
    digits += 1;
  }
  if (digits !== 32) throw new Error("not an id");
}

/** `uuid[]` of ids in their text form. */
export function uuids(values: Elements<string>): Buffer {
  return pack(TYPE.uuid, values, fixed(16), writeId);
}

/** `text[]`. */
export function texts(values: Elements<string>): Buffer {
  return pack(TYPE.text, values, Buffer.byteLength, (out, at, value) => {
    out.write(value, at, "utf8");
  });
}

/** `bytea[]`. */
export function byteas(values: Elements<Uint8Array>): Buffer {
  return pack(
    TYPE.bytea,
    values,
    (value) => value.length,
    (out, at, value) => out.set(value, at),
  );
}

/** `integer[]`. */
export function integers(values: Elements<number>): Buffer {
  return pack(TYPE.int4, values, fixed(4), (out, at, value) => out.writeInt32BE(value, at));
}

/** `smallint[]`. */
export function smallints(values: Elements<number>): Buffer {
  return pack(TYPE.int2, values, fixed(2), (out, at, value) => out.writeInt16BE(value, at));
}

/** `real[]`. */
export function reals(values: Elements<number>): Buffer {
  return pack(TYPE.float4, values, fixed(4), (out, at, value) => out.writeFloatBE(value, at));
}
