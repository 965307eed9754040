/**
 * Times several tasks in turn, so that what else the machine does falls on all alike; the first round only warms up.
 * @param {number} rounds
 * @param {Record<string, () => unknown>} tasks
 * @param {() => number} clock `wallTime`, or `cpuTime` for tasks that only calculate in this process
 * @returns {Promise<Record<string, {min: number, median: number, max: number}>>} milliseconds
 */
export async function measure(rounds, tasks, clock = wallTime) {
  const times = Object.fromEntries(Object.keys(tasks).map((name) => [name, []]))
  for (let round = 0; round <= rounds; round++) {
    for (const [name, task] of Object.entries(tasks)) {
      const start = clock()
      await task()
      if (round > 0) times[name].push(clock() - start)
    }
  }
  return Object.fromEntries(Object.entries(times).map(([name, list]) => [name, spread(list)]))
}

/** Milliseconds on the clock. */
export const wallTime = () => performance.now()

/** Milliseconds of processor time of this process, which other programs on the machine do not lengthen. */
export function cpuTime() {
  const { user, system } = process.cpuUsage()
  return (user + system) / 1000
}

function spread(list) {
  const sorted = [...list].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  const median = sorted.length % 2 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2
  return { min: sorted[0], median, max: sorted[sorted.length - 1] }
}
