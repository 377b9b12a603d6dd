import { answer } from './logic/answer';
import type { LiveRequest } from './live.messages';

self.onmessage = ({ data }: MessageEvent<LiveRequest>) => {
  const reply = answer(data, () => performance.now());
  const arrays =
    reply.kind === 'refused'
      ? []
      : [
          reply.spectrum.real,
          reply.spectrum.imag,
          ...(reply.kind === 'simulated' ? [reply.fid.real, reply.fid.imag] : []),
        ];
  self.postMessage(reply, { transfer: [...new Set(arrays.map((array) => array.buffer))] });
};
