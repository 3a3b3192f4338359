export declare function egm96Centimetres(): Int16Array;
export declare function egm96Gtx(cm: Int16Array, westDeg: 0 | -180): Uint8Array;
export declare function egm96Pgm(cm: Int16Array): Uint8Array;
