import { readNetwork } from '@stillroom/shared/notation';

/** Reads the texts that would hold up typing. Each answer bears the number of its question. */
export interface ReadingQuestion {
  readonly number: number;
  readonly text: string;
}

self.addEventListener('message', ({ data }: MessageEvent<ReadingQuestion>) => {
  self.postMessage({ number: data.number, complaints: readNetwork(data.text).complaints });
});
