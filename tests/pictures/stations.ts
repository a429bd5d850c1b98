import type { Page } from 'playwright-core';
import type { Stage, Who } from './stage.ts';
import { doors } from './doors.ts';
import { notebooks } from './notebooks.ts';
import { records } from './records.ts';
import { rooms } from './rooms.ts';

/** One page in one state, as one person sees it. */
export interface Station {
  readonly name: string;
  readonly who: Who;
  /** Brings the page there; may give back how to leave it for the next one. */
  readonly show: (page: Page, stage: Stage) => Promise<(() => Promise<void>) | void>;
  /** Where it is looked at; an open menu closes when the window changes. All widths where nothing is said. */
  readonly widths?: readonly number[];
  /** Taken on paper instead. */
  readonly print?: boolean;
}

export const stations: readonly Station[] = [...doors, ...rooms, ...notebooks, ...records];
