import type { Request } from 'express';
import type { DataSource, EntityManager } from 'typeorm';

/**
 * Does the work in one transaction for a changing request, or without one for a reading request. What was changed is
 * committed before the answer goes out; a refusal rolls it back.
 */
export function inTransaction<T>(
  database: DataSource,
  request: Request,
  work: (manager: EntityManager) => Promise<T>,
): Promise<T> {
  const reads = request.method === 'GET' || request.method === 'HEAD';
  return reads ? work(database.manager) : database.transaction(work);
}
