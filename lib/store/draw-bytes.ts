/** Posterior draws as bytes: little-endian IEEE 754 float64, row-major, on every machine. */
import { StoreError } from './store-error';

const BYTES = Float64Array.BYTES_PER_ELEMENT;

export function encodeDraws(values: ArrayLike<number>): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(values.length * BYTES);
  const view = new DataView(bytes.buffer);
  for (let i = 0; i < values.length; i++) view.setFloat64(i * BYTES, values[i]!, true);
  return bytes;
}

/** @throws StoreError 'inconsistent-row' when the length is no whole number of values. */
export function decodeDraws(bytes: Uint8Array): Float64Array {
  if (bytes.byteLength % BYTES !== 0) {
    throw new StoreError('inconsistent-row', `draws of ${bytes.byteLength} bytes are no float64 values`);
  }
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const values = new Float64Array(bytes.byteLength / BYTES);
  for (let i = 0; i < values.length; i++) values[i] = view.getFloat64(i * BYTES, true);
  return values;
}
