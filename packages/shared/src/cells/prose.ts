import * as z from 'zod/mini';

/** Settings of a prose cell: none, all is in its text. */
export const proseSettings = z.strictObject({});

/** A value woven into prose, as it reads there, and the digest of the cell it comes from. */
export interface WovenValue {
  readonly path: string;
  readonly text: string;
  readonly digest: string;
}

/**
 * Markdown set as HTML without raw HTML and without style attributes. Mathematics stands as
 * `<span data-tex="…">` (displayed: with `data-display`), woven values as `<span data-path="…" data-cell="…">`,
 * references to numbered cells as `<a href="#name" data-reference="name">` with the number left to the page, works cited as
 * `<span data-cite="key">` (links where cited by DOI), their list as `<ul class="references">` with `<li data-entry="key">`.
 */
export interface ProseResult {
  readonly html: string;
  readonly values: readonly WovenValue[];
  readonly headings: readonly { readonly level: number; readonly text: string }[];
}
