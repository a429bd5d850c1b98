/** The cluster that tests use; see test-cluster.mjs. */
export function useTestCluster(): Promise<{
  readonly owner: string;
  readonly application: string;
  release(): Promise<void>;
}>;
