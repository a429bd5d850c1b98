import { messageTypes, type CellNotice } from '@stillroom/shared/protocol';
import * as encoding from 'lib0/encoding';

/** A notice with the text of the result that rides along. */
export interface CellNews {
  readonly notice: CellNotice;
  readonly json: string | null;
}

/** Characters of results that ride along when somebody joins; what is beyond is fetched. */
const joiningResults = 1_000_000;

/** A result is JSON already: it is set in as it is, not read and written anew for every keystroke. */
function noticeText({ notice, json }: CellNews): string {
  const text = JSON.stringify(notice);
  return json === null ? text : `${text.slice(0, -1)},"result":${json}}`;
}

/** The frame of a `PlanNotice`. */
export function planFrame(whole: boolean, news: readonly CellNews[], gone: readonly string[]): Uint8Array {
  let room = joiningResults;
  const cells = news.map((cell) => {
    const fits = cell.json !== null && (room -= cell.json.length) >= 0;
    return noticeText(fits ? cell : { ...cell, json: null });
  });
  const encoder = encoding.createEncoder();
  encoding.writeVarUint(encoder, messageTypes.plan);
  const end = gone.length > 0 ? `,"gone":${JSON.stringify(gone)}` : '';
  encoding.writeVarString(encoder, `{"whole":${whole},"cells":[${cells.join(',')}]${end}}`);
  return encoding.toUint8Array(encoder);
}
