import type { TestProject } from 'vitest/node';
import { useTestCluster } from '../../scripts/lib/test-cluster.mjs';

declare module 'vitest' {
  interface ProvidedContext {
    /** Addresses of the maintenance database of the cluster for tests. */
    cluster: { readonly owner: string; readonly application: string };
  }
}

/** Starts the cluster for tests where it does not run, and stops it after the last run that uses it. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const { owner, application, release } = await useTestCluster();
  project.provide('cluster', { owner, application });
  return release;
}
