import { messageTypes, type Notice, type PlanNotice } from '@stillroom/shared/protocol';
import * as decoding from 'lib0/decoding';
import * as encoding from 'lib0/encoding';

/** Kinds of a sync message, as y-protocols numbers them. */
export const syncKinds = { step1: 0, step2: 1, update: 2 } as const;

function frame(type: number, body: (encoder: encoding.Encoder) => void): Uint8Array {
  const encoder = encoding.createEncoder();
  encoding.writeVarUint(encoder, type);
  body(encoder);
  return encoding.toUint8Array(encoder);
}

const syncFrame = (kind: number, bytes: Uint8Array): Uint8Array =>
  frame(messageTypes.sync, (encoder) => {
    encoding.writeVarUint(encoder, kind);
    encoding.writeVarUint8Array(encoder, bytes);
  });

/** Asks the other end for everything this state vector lacks. */
export const step1Frame = (stateVector: Uint8Array): Uint8Array => syncFrame(syncKinds.step1, stateVector);
/** Answers a step 1. */
export const step2Frame = (update: Uint8Array): Uint8Array => syncFrame(syncKinds.step2, update);
export const updateFrame = (update: Uint8Array): Uint8Array => syncFrame(syncKinds.update, update);

export const awarenessFrame = (update: Uint8Array): Uint8Array =>
  frame(messageTypes.awareness, (encoder) => encoding.writeVarUint8Array(encoder, update));

/** Says how many of a connection's document frames are committed. */
export const keptFrame = (count: number): Uint8Array =>
  frame(messageTypes.kept, (encoder) => encoding.writeVarUint(encoder, count));

export const planFrame = (plan: PlanNotice): Uint8Array =>
  frame(messageTypes.plan, (encoder) => encoding.writeVarString(encoder, JSON.stringify(plan)));

export const noticeFrame = (notice: Notice): Uint8Array =>
  frame(messageTypes.notice, (encoder) => encoding.writeVarString(encoder, JSON.stringify(notice)));

/** A frame that this end may receive, read. */
export type Incoming =
  | { readonly kind: 'step1'; readonly stateVector: Uint8Array }
  | { readonly kind: 'step2' | 'update'; readonly update: Uint8Array }
  | { readonly kind: 'awareness'; readonly update: Uint8Array };

/** Reads a frame; null where it is none of this protocol (also when cut short or followed by more). */
export function readFrame(bytes: Uint8Array): Incoming | null {
  try {
    const decoder = decoding.createDecoder(bytes);
    const incoming = readBody(decoder);
    return decoding.hasContent(decoder) ? null : incoming;
  } catch {
    return null;
  }
}

function readBody(decoder: decoding.Decoder): Incoming | null {
  const type = decoding.readVarUint(decoder);
  if (type === messageTypes.awareness)
    return { kind: 'awareness', update: decoding.readVarUint8Array(decoder) };
  if (type !== messageTypes.sync) return null;
  const kind = decoding.readVarUint(decoder);
  const body = decoding.readVarUint8Array(decoder);
  if (kind === syncKinds.step1) return { kind: 'step1', stateVector: body };
  if (kind === syncKinds.step2) return { kind: 'step2', update: body };
  if (kind === syncKinds.update) return { kind: 'update', update: body };
  return null;
}

/** The update that changes nothing: no structs, no deletions. */
export const isEmptyUpdate = (update: Uint8Array): boolean =>
  update.length === 2 && update[0] === 0 && update[1] === 0;
