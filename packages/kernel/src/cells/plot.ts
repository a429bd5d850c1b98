import type { CellJob, PlotResult } from '@stillroom/shared/cells';
import { formSpecification } from '../plots/form.ts';
import { textSpecification } from '../plots/specification.ts';

/**
 * Makes the Vega-Lite 6 specification of a plot, data included, from its form or, where it has a text, from that.
 *
 * @returns the result and what was left out, in words
 * @throws CellFailure where a path leads nowhere, the text is no specification, or data come from an address
 */
export function evaluatePlot(job: CellJob): { result: PlotResult; warnings: readonly string[] } {
  if (job.text.trim() !== '') return { result: { spec: textSpecification(job) }, warnings: [] };
  const { spec, warnings } = formSpecification(job);
  return { result: { spec }, warnings };
}
