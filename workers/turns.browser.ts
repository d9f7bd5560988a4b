// Owns how a worker lets its messages in between slices.
// Must not know what runs.

/** setTimeout waits 4 ms when nested; a message channel waits for nothing but the queue. */
export function makeTurns(): (milliseconds: number) => Promise<void> {
  const channel = new MessageChannel();
  const waiting: (() => void)[] = [];
  channel.port1.onmessage = () => waiting.shift()?.();
  return (milliseconds) =>
    new Promise((resolve) => {
      if (milliseconds > 0) {
        setTimeout(resolve, milliseconds);
        return;
      }
      waiting.push(resolve);
      channel.port2.postMessage(null);
    });
}
