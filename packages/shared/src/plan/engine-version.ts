/**
 * The version of the engine, part of every digest and named in every record. It is raised whenever a result of any kind
 * may change by so much as a bit; results kept under an older version are then computed anew. A test compares the results
 * of fixed notebooks with those written down for this version (tests/reference/result-digests.json) and says how to raise
 * it.
 */
export const engineVersion = '0.2.4';
