import { leaveTestCluster } from './cluster';

export default function tearDown(): void {
  leaveTestCluster();
}
