/** Keys and kinds that belong to the format but that this version does not compute yet. They are refused in words: a key
 *  that is read and then left out of the answer would be worse. An entry goes when its part lands; what reads the key may
 *  already stand in the schema. Written `object.key`, `quantity.key` or
 *  `determination=kind`. */
const unbuilt: ReadonlySet<string> = new Set();

/** Whether this version computes what a key says. @param name of the object, or the key under which a quantity stands */
export const isBuilt = (name: string, key: string): boolean => !unbuilt.has(`${name}.${key}`);

/** Whether this version computes a kind of a variant. */
export const isBuiltKind = (variant: string, kind: string): boolean => !unbuilt.has(`${variant}=${kind}`);

/** The entries, for the test that they are refused. */
export const unbuiltEntries = (): readonly string[] => [...unbuilt];
