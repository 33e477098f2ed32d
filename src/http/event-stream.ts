/** One message of a `text/event-stream` (WHATWG HTML, server-sent events). */
export interface StreamMessage {
  readonly event: string;
  readonly id?: string;
  readonly data: unknown;
}

const written = ({ event, id, data }: StreamMessage): string =>
  `${id === undefined ? '' : `id: ${id}\n`}event: ${event}\ndata: ${JSON.stringify(data)}\n\n`;

export interface OpenStream {
  readonly say: (message: StreamMessage) => void;
  readonly end: () => void;
}

/**
 * An answer that stays open. `begin` gets the way to speak; what it returns is called once, when the
 * reader has gone or the stream has ended.
 */
export const eventStream = (begin: (stream: OpenStream) => () => void): Response => {
  const bytes = new TextEncoder();
  let finish: () => void = () => undefined;
  let over = false;
  const body = new ReadableStream<Uint8Array>({
    start: (controller) => {
      const end = () => {
        if (over) return;
        over = true;
        finish();
        controller.close();
      };
      const say = (message: StreamMessage) => {
        if (!over) controller.enqueue(bytes.encode(written(message)));
      };
      finish = begin({ say, end });
    },
    cancel: () => {
      if (over) return;
      over = true;
      finish();
    },
  });
  return new Response(body, {
    headers: {
      'content-type': 'text/event-stream; charset=utf-8',
      // Neither kept nor packed nor held back on the way.
      'cache-control': 'no-store, no-transform',
      'x-accel-buffering': 'no',
    },
  });
};
