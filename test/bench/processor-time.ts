// Time a piece of work takes of the processor: other work on the machine counts little.

/** ms of processor time that a run uses, the quickest of several after one to warm up. */
export function processorMs(run: () => unknown, runs = 5): number {
  run();
  const times = Array.from({ length: runs }, () => {
    const began = process.cpuUsage();
    run();
    const { user, system } = process.cpuUsage(began);
    return (user + system) / 1000;
  });
  return Math.min(...times);
}
