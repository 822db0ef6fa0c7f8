/** Rows a statement may carry: PostgreSQL takes 65,535 parameters, and no table here has more than 20 columns. */
const most = 2_000

export async function inPortions<T>(rows: T[], put: (some: T[]) => Promise<unknown>): Promise<void> {
  for (let start = 0; start < rows.length; start += most) await put(rows.slice(start, start + most))
}
