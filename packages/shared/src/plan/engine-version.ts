/**
 * The version of the engine, part of every digest. It changes whenever a result of any kind may change by so much as
 * a bit; results kept under an older version are then computed anew.
 */
export const engineVersion = '0.1.0';
