/** ln of the sum of what the logarithms stand for; −Infinity for none. */
export function logSum(logs: readonly number[]): number {
  const most = Math.max(...logs, -Infinity)
  if (most === -Infinity) return most
  return most + Math.log(logs.reduce((sum, log) => sum + Math.exp(log - most), 0))
}
