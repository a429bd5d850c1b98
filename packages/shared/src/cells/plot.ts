import * as z from 'zod/mini';
import { cellReference } from './settings.ts';

const path = z.string().check(z.minLength(1), z.maxLength(500));
const axis = z.strictObject({
  title: z.optional(z.string().check(z.maxLength(200))),
  scale: z.optional(z.enum(['linear', 'log', 'sqrt', 'symlog'])),
});

export const plotMarks = ['line', 'point', 'area', 'bar'] as const;
/** What stands in a picture of its own beside the others: each part of the form, or each of its lines. */
export const plotFacets = ['cell', 'line'] as const;
export type PlotFacet = (typeof plotFacets)[number];

export type PlotMark = (typeof plotMarks)[number];

/** Settings of a plot cell's form; a text with a Vega-Lite specification takes its place. */
export const plotSettings = z.strictObject({
  draw: z.optional(
    z
      .array(
        z.strictObject({
          cell: cellReference,
          /** Paths within the result of that cell, such as `times` and `species.P`. */
          x: path,
          y: z.array(path).check(z.maxLength(50)),
          /** Put before the names of its lines, to tell several cells apart; the heading of its picture among several. */
          label: z.optional(z.string().check(z.maxLength(100))),
        }),
      )
      .check(z.maxLength(50)),
  ),
  mark: z.optional(z.enum(plotMarks)),
  x: z.optional(axis),
  y: z.optional(axis),
  /** Small pictures side by side in place of one; on the same axes unless that is false. */
  facets: z.optional(z.strictObject({ by: z.enum(plotFacets), sameAxes: z.optional(z.boolean()) })),
  caption: z.optional(z.string().check(z.maxLength(2000))),
  /** What the picture shows, for those who do not see it. */
  alternative: z.optional(z.string().check(z.maxLength(2000))),
});

export type PlotSettings = z.infer<typeof plotSettings>;

/** A Vega-Lite 6 specification that holds its data. */
export interface PlotResult {
  readonly spec: Readonly<Record<string, unknown>>;
}
