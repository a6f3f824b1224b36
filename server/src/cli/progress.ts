/** How far a long run is, on a terminal only and gone when it ends. */

export interface Progress {
  readonly step: () => void;
  readonly end: () => void;
}

const NONE: Progress = { step: () => {}, end: () => {} };
/** ms before the first sign and between two. */
const PATIENCE = 400;

/** Shows "12 of 300 plans" on standard error while it is a terminal; shows nothing for short runs. */
export function progressOf(total: number, stream: NodeJS.WriteStream = process.stderr): Progress {
  if (!stream.isTTY) return NONE;
  let done = 0;
  let last = Date.now();
  let shown = false;
  return {
    step() {
      done += 1;
      if (Date.now() - last < PATIENCE) return;
      last = Date.now();
      shown = true;
      stream.write(`\r\x1b[K${done} of ${total} plans`);
    },
    end() {
      if (shown) stream.write('\r\x1b[K');
    },
  };
}
