/** What a source may send at most; told in the welcome, checked before memory is spent. */
export interface SourceLimits {
  /** Bytes of one message, text or binary. */
  readonly frameBytes: number;
  /** Records with content in one frame; records declared lost do not count, they take no room. */
  readonly records: number;
  readonly parts: number;
  /** Frames sent and not yet acknowledged. */
  readonly framesInFlight: number;
  /** Bytes of one row in the row forms. */
  readonly rowBytes: number;
}

export const sourceLimits: SourceLimits = {
  frameBytes: 1_048_576,
  records: 65_536,
  parts: 256,
  framesInFlight: 64,
  rowBytes: 16_384,
};

/** For frames read back from the plant's own storage: what was accepted under any setting stays readable. */
export const storedLimits: SourceLimits = {
  frameBytes: 268_435_456,
  records: 4_294_967_295,
  parts: 65_535,
  framesInFlight: 1,
  rowBytes: 0,
};
