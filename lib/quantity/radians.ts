declare const unit: unique symbol;

/** An angle in radians; branded so that degrees do not compile where radians are meant. */
export type Radians = number & { readonly [unit]: 'rad' };

/** Degrees to radians. @param degrees angle in degrees, any finite value */
export const degToRad = (degrees: number): Radians => ((degrees * Math.PI) / 180) as Radians;

/** Radians to degrees. */
export const radToDeg = (radians: Radians): number => (radians * 180) / Math.PI;
