/**
 * What a refusal does. 'frame': the frame (in the row forms: the request or file from that row on) is
 * not taken, the connection goes on. 'connection': the connection ends after the refusal is said.
 * 'set-aside': the frame is taken and acknowledged, the records named are kept but not counted.
 */
export type RefusalEffect = 'frame' | 'connection' | 'set-aside';

export interface RefusalRule {
  readonly effect: RefusalEffect;
  readonly sentence: string;
}

/** Every refusal a source can meet. Codes are stable: none is renamed or given another meaning within a version. */
export const refusalTable = {
  'not-json': { effect: 'frame', sentence: 'The text is not JSON.' },
  'not-a-frame': { effect: 'frame', sentence: 'The message is not a frame of records.' },
  'unknown-version': { effect: 'frame', sentence: 'The binary frame has a layout version this server does not read.' },
  truncated: { effect: 'frame', sentence: 'The binary frame ends before its content does.' },
  'trailing-bytes': { effect: 'frame', sentence: 'Bytes follow after the last part of the binary frame.' },
  'reserved-not-zero': { effect: 'frame', sentence: 'A reserved field of the binary frame is not zero.' },
  'unknown-kind': { effect: 'frame', sentence: 'A part or row is of a kind this version does not know.' },
  'unknown-name': { effect: 'frame', sentence: 'The binary frame refers to a name or origin its table does not hold.' },
  'missing-field': { effect: 'frame', sentence: 'A field that has to be there is missing.' },
  'unknown-field': { effect: 'frame', sentence: 'A field is there that this version does not know.' },
  'wrong-type': { effect: 'frame', sentence: 'A field holds a value of another type than expected.' },
  'wrong-length': { effect: 'frame', sentence: 'The columns of a part differ in length.' },
  'out-of-range': { effect: 'frame', sentence: 'A value is outside its range.' },
  'not-rising': { effect: 'frame', sentence: 'Places of nonconforming units must rise strictly and stay inside the part.' },
  'bad-id': { effect: 'frame', sentence: 'An id must be 1 to 64 letters, digits, points, underscores or hyphens.' },
  'bad-text': { effect: 'frame', sentence: 'A reason must be 1 to 500 characters of well-formed text without control characters.' },
  'bad-time': { effect: 'frame', sentence: 'A time must be whole milliseconds since 1970-01-01 UTC, up to the year 9999.' },
  'bad-sequence': { effect: 'frame', sentence: 'A sequence must be a whole number from 1 to 9,007,199,254,740,991.' },
  'bad-correction': { effect: 'frame', sentence: 'A correction must name a lower sequence than its own.' },
  'bad-row': { effect: 'frame', sentence: 'A row must say exactly one thing: a verdict, a tally, a count, a value or an event.' },
  'empty-frame': { effect: 'frame', sentence: 'A frame must hold at least one part with at least one record.' },
  'too-many-records': { effect: 'frame', sentence: 'The frame holds more records than the limit.' },
  'too-many-parts': { effect: 'frame', sentence: 'The frame holds more parts than the limit.' },
  'sequence-gap': { effect: 'frame', sentence: 'The frame begins after the next expected sequence; send again from there.' },
  'station-not-allowed': { effect: 'frame', sentence: "The source's token does not cover this station." },
  'product-not-allowed': { effect: 'frame', sentence: "The source's token does not cover this product." },
  'frame-too-large': { effect: 'connection', sentence: 'The message is larger than the limit.' },
  'too-many-in-flight': { effect: 'connection', sentence: 'More frames are in flight than the server granted.' },
  'foreign-origin': { effect: 'connection', sentence: 'A page of another place asked for the connection.' },
  'token-missing': { effect: 'connection', sentence: 'No token was sent.' },
  'token-unknown': { effect: 'connection', sentence: 'The token is not known, or was withdrawn.' },
  'subprotocol-missing': { effect: 'connection', sentence: 'The connection did not offer a subprotocol this server speaks.' },
  replaced: { effect: 'connection', sentence: 'The same source connected again; the older connection is ended.' },
  'not-stored': { effect: 'connection', sentence: 'The server could not make the frame durable; it is not acknowledged.' },
  'unknown-station': { effect: 'set-aside', sentence: 'The plant has no such station.' },
  'unknown-line': { effect: 'set-aside', sentence: 'The plant has no such line.' },
  'unknown-product': { effect: 'set-aside', sentence: 'The plant has no such product or characteristic.' },
  'time-implausible': { effect: 'set-aside', sentence: 'The time of inspection is too far from the server clock.' },
  'correction-unmatched': { effect: 'set-aside', sentence: 'The corrected record is unknown, of another kind, or too old.' },
} as const satisfies Readonly<Record<string, RefusalRule>>;

export type RefusalCode = keyof typeof refusalTable;

/** Whether the connection ends after this refusal is said. */
export function endsConnection(code: RefusalCode): boolean {
  return refusalTable[code].effect === 'connection';
}
