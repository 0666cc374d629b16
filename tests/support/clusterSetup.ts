import { testCluster } from './cluster';

export default function setUp(): void {
  testCluster();
}
