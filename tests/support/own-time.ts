/**
 * Milliseconds of the processor that `work` takes in this process, the least of several times after one to warm up:
 * what else the machine does takes no part in it.
 */
export function ownTime(work: () => void, times = 3): number {
  work();
  const taken = Array.from({ length: times }, () => {
    const before = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(before);
    return (user + system) / 1000;
  });
  return Math.min(...taken);
}
