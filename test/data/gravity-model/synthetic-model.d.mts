export declare const GM_M3S2: number;
export declare const RADIUS_M: number;
export interface SyntheticModel {
  readonly maxDegree: number;
  readonly gmM3s2: number;
  readonly radiusM: number;
  readonly cosine: Float64Array;
  readonly sine: Float64Array;
  readonly sigma: Float32Array;
}
export declare function syntheticModel(maxDegree: number, seed?: number): SyntheticModel;
export declare function gfcPieces(
  model: SyntheticModel,
  options?: { readonly sigmas?: boolean; readonly tide?: string },
): Generator<string>;
export declare function egmFiles(
  model: SyntheticModel,
  name: string,
  ellipsoid: { angularVelocity: number; a: number; f: number; gm: number },
): { readonly properties: string; readonly coefficients: Uint8Array };
