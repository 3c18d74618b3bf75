/** The list of no places, shared: most parts of a good line have none. Never transfer its buffer to another thread. */
export const noPlaces = new Uint32Array(0);
