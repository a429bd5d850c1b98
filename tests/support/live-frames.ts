import { messageTypes } from '@stillroom/shared/protocol';
import * as encoding from 'lib0/encoding';
import * as Y from 'yjs';

/** Frames written by hand, as somebody would who does not use our client. */
export const frames = {
  step1: (doc: Y.Doc) => sync(0, Y.encodeStateVector(doc)),
  step2: (update: Uint8Array) => sync(1, update),
  update: (update: Uint8Array) => sync(2, update),
  awareness(client: number, state: object | null): Uint8Array {
    const encoder = encoding.createEncoder();
    encoding.writeVarUint(encoder, 1);
    encoding.writeVarUint(encoder, client);
    encoding.writeVarUint(encoder, 1);
    encoding.writeVarString(encoder, JSON.stringify(state));
    return frame(messageTypes.awareness, encoding.toUint8Array(encoder));
  },
} as const;

function frame(type: number, body: Uint8Array): Uint8Array {
  const encoder = encoding.createEncoder();
  encoding.writeVarUint(encoder, type);
  encoding.writeVarUint8Array(encoder, body);
  return encoding.toUint8Array(encoder);
}

function sync(kind: number, body: Uint8Array): Uint8Array {
  const encoder = encoding.createEncoder();
  encoding.writeVarUint(encoder, messageTypes.sync);
  encoding.writeVarUint(encoder, kind);
  encoding.writeVarUint8Array(encoder, body);
  return encoding.toUint8Array(encoder);
}
