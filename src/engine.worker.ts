import { answerLive } from './app/case-file/motion/live-computation';
import type { LiveRequest } from './app/case-file/motion/live-messages';

/** The engine beside the page: each request is answered in turn, the page decides which it sends. */
addEventListener('message', ({ data }: MessageEvent<LiveRequest>) => {
  postMessage(answerLive(data));
});
