import { releaseTestCluster } from './test-cluster'

/** Runs once around all test files, in the process that starts the others. */
export default function setup(): () => Promise<void> {
  process.env.TEST_RUN_PID = String(process.pid)
  return releaseTestCluster
}
