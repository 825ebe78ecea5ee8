import { constants } from 'node:os';

/**
 * Ends the program with status 130 on Ctrl-C and 143 on SIGTERM, after `onEnd`. Files are written in one step of this
 * thread (under another name, then renamed), so no signal finds one half written. Answers how to stop listening.
 */
export function endOnSignals(onEnd: () => void): () => void {
  const signals = ['SIGINT', 'SIGTERM'] as const;
  const listeners = signals.map((signal) => {
    const listener = () => {
      onEnd();
      process.exit(128 + constants.signals[signal]);
    };
    process.on(signal, listener);
    return { signal, listener };
  });
  return () => {
    for (const { signal, listener } of listeners) process.off(signal, listener);
  };
}

/**
 * Tells of the first Ctrl-C or SIGTERM, with the status to end with once what is known is told; a second one ends the
 * program at once. Answers how to stop listening.
 */
export function onFirstSignal(tell: (status: number) => void): () => void {
  let come = false;
  const signals = ['SIGINT', 'SIGTERM'] as const;
  const listeners = signals.map((signal) => {
    const status = 128 + constants.signals[signal];
    const listener = () => {
      if (come) process.exit(status);
      come = true;
      tell(status);
    };
    process.on(signal, listener);
    return () => process.off(signal, listener);
  });
  return () => {
    for (const release of listeners) release();
  };
}
