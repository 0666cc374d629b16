import { execFileSync } from 'node:child_process';
import path from 'node:path';

export type TemplateKind = 'migrated' | 'seeded';

/** How to reach the test cluster; printed by docker-free-scripts/test-cluster.mjs. */
export interface TestCluster {
  port: number;
  superuserPassword: string;
  passwords: Record<string, string>;
  /** The photos that belong to the seeded template. */
  seededFiles?: string;
  /** The process on whose behalf the cluster runs; its databases carry this number. */
  user: number;
  templates: Partial<Record<TemplateKind, string>>;
}

const script = path.join(__dirname, '..', '..', 'docker-free-scripts', 'test-cluster.mjs');

function call(...args: string[]): string {
  return execFileSync(process.execPath, [script, ...args], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'inherit'] });
}

/**
 * The cluster with a template of this kind, started and prepared if need be (10 ms once known, some seconds the first time).
 * Jest's workers inherit what the global set-up found out through the environment.
 */
export function testCluster(kind: TemplateKind = 'migrated'): TestCluster {
  const known = process.env.TRAYWARD_TEST_CLUSTER;
  const cluster = known ? (JSON.parse(known) as TestCluster) : undefined;
  if (cluster?.templates[kind]) return cluster;
  const answer = call('up', String(cluster?.user ?? process.pid), kind);
  process.env.TRAYWARD_TEST_CLUSTER = answer;
  return JSON.parse(answer) as TestCluster;
}

/** Tells the cluster that this run is over; the last run to leave stops it. */
export function leaveTestCluster(): void {
  call('down', String(process.pid));
}
