/** Keys and kinds that belong to the format but that this version does not compute yet. They are refused in words: a key
 *  that is read and then left out of the answer would be worse. An entry goes when its part lands; what reads the key may
 *  already stand in the schema. Written `object.key`, or `determination=kind`. */
export const unbuilt: ReadonlySet<string> = new Set([
  'site.position',
  'ellipsoidal height.frame',
  'ellipsoidal height.epoch',
  'ellipsoidal height.rate',
  'datum.frame',
  'datum.epoch',
  'normal-height.field',
  'height anomaly.grid',
  'geoid height.grid',
  'measurement.series',
  'determination=normal-orthometric-height',
  'determination=gravity-model',
]);
