import { FRAME_NAMES, readFrameName } from '../../earth/frames/frame-name.js';
import { number, text } from './descriptor.js';

/** Decimal years; the drift between frames is known from 1980 on. */
export const EPOCH = number({ min: 1980, max: 2100, because: 'decimal years' });

/** A terrestrial frame between which published parameters are built in. */
export const FRAME = text(FRAME_NAMES, (name) => {
  const read = readFrameName(name);
  return read.ok ? null : read.expected;
});
