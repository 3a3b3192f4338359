/** Processor time of a call, s: what other programs do on the machine at the same time does not count. */
export function cpuSeconds(call: () => unknown): number {
  const before = process.cpuUsage();
  call();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6;
}
