import { viewOf } from '../../file-bytes/byte-source.js';

/** Undoes TIFF's prediction along rows, in place.
 *  2: differences of neighbouring samples (TIFF 6.0, section 14), in the byte order of the file;
 *  3: floating point, bytes of a row sorted by significance and differenced (Adobe Photoshop TIFF Technical Note 3, 2005).
 * @param samplesPerRow samples in a row, all channels together; @param stride channels that are interleaved
 * @returns false if there is no such predictor for samples of this size */
export function undoPredictor(
  bytes: Uint8Array,
  predictor: number,
  samplesPerRow: number,
  stride: number,
  bytesPerSample: number,
  littleEndian: boolean,
): boolean {
  if (predictor === 1) return true;
  const rowBytes = samplesPerRow * bytesPerSample;
  for (let at = 0; at + rowBytes <= bytes.length; at += rowBytes) {
    const row = bytes.subarray(at, at + rowBytes);
    if (predictor === 3) undoFloatingPoint(row, stride, bytesPerSample, littleEndian);
    else if (predictor !== 2 || !undoHorizontal(row, stride, bytesPerSample, littleEndian)) return false;
  }
  return true;
}

function undoHorizontal(row: Uint8Array, stride: number, bytesPerSample: number, little: boolean): boolean {
  const view = viewOf(row);
  const count = row.length / bytesPerSample;
  switch (bytesPerSample) {
    case 1:
      for (let i = stride; i < count; i++) row[i] = row[i]! + row[i - stride]!;
      return true;
    case 2:
      for (let i = stride; i < count; i++)
        view.setUint16(
          2 * i,
          (view.getUint16(2 * i, little) + view.getUint16(2 * (i - stride), little)) & 0xffff,
          little,
        );
      return true;
    case 4:
      for (let i = stride; i < count; i++)
        view.setUint32(4 * i, (view.getUint32(4 * i, little) + view.getUint32(4 * (i - stride), little)) >>> 0, little);
      return true;
    case 8:
      for (let i = stride; i < count; i++)
        view.setBigUint64(
          8 * i,
          BigInt.asUintN(64, view.getBigUint64(8 * i, little) + view.getBigUint64(8 * (i - stride), little)),
          little,
        );
      return true;
    default:
      return false;
  }
}

function undoFloatingPoint(row: Uint8Array, stride: number, bytesPerSample: number, little: boolean): void {
  for (let i = stride; i < row.length; i++) row[i] = row[i]! + row[i - stride]!;
  const planes = row.slice();
  const count = row.length / bytesPerSample;
  // the first plane holds the most significant bytes, whatever the byte order of the file
  for (let i = 0; i < count; i++)
    for (let b = 0; b < bytesPerSample; b++)
      row[i * bytesPerSample + (little ? bytesPerSample - 1 - b : b)] = planes[b * count + i]!;
}
