/**
 * Times several tasks in turn, so that what else the machine does falls on all alike; the first round only warms up.
 * @param {number} rounds
 * @param {Record<string, () => unknown>} tasks
 * @returns {Promise<Record<string, {min: number, median: number, max: number}>>} milliseconds
 */
export async function measure(rounds, tasks) {
  const times = Object.fromEntries(Object.keys(tasks).map((name) => [name, []]))
  for (let round = 0; round <= rounds; round++) {
    for (const [name, task] of Object.entries(tasks)) {
      const start = performance.now()
      await task()
      if (round > 0) times[name].push(performance.now() - start)
    }
  }
  return Object.fromEntries(Object.entries(times).map(([name, list]) => [name, spread(list)]))
}

function spread(list) {
  const sorted = [...list].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  const median = sorted.length % 2 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2
  return { min: sorted[0], median, max: sorted[sorted.length - 1] }
}
