/** Ends the process cleanly at SIGTERM or SIGINT: what runs is closed first, once, however often the signal comes. */
export function stopOnSignals(running: { readonly close: () => Promise<void> }): void {
  let stopping = false;
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.on(signal, () => {
      if (stopping) return;
      stopping = true;
      running.close().then(() => process.exit(0), (error: unknown) => {
        console.error('The server did not stop cleanly.', error);
        process.exit(1);
      });
    });
  }
}
