import { messageTypes } from '@stillroom/shared/protocol';

/** Second byte of a sync message that carries changes: sync step 2 and update, as in y-protocols. */
const carrying: readonly number[] = [1, 2];

/** Whether a frame carries document changes. Both integers are below 128, so each is one byte. */
export function isDocumentFrame(data: unknown): boolean {
  return (
    data instanceof Uint8Array && data[0] === messageTypes.sync && carrying.some((step) => step === data[1])
  );
}

/** A WebSocket class that reports each document frame just before it is sent. */
export function countingSocket(onDocumentFrame: () => void): typeof WebSocket {
  return class CountingSocket extends WebSocket {
    override send(data: string | ArrayBufferLike | Blob | ArrayBufferView<ArrayBuffer>): void {
      if (isDocumentFrame(data)) onDocumentFrame();
      super.send(data);
    }
  };
}
