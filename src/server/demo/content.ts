/** The demo shop's data as they lie in content/demo. */
import { readFileSync, readdirSync } from 'node:fs';
import type { Incident, PartKind } from '@/domain/parts/kinds';
import type { Symptom } from '@/domain/tickets/vocabulary';

export type DemoBoard = {
  code: string;
  revision: string;
  maker: string;
  about: string;
  models: { maker: string; name: string; category: string }[];
  positions: string[];
  nets: { name: string; label: string; probe: boolean }[];
  parts: {
    ref: string;
    kind: PartKind;
    nets: [string, string] | null;
    ohms: number | null;
    tolerance: number | null;
    closed?: string[];
    value: string;
    protection: boolean;
    note: string;
  }[];
};

export type DemoScenario = {
  key: string;
  board: string;
  faults: { ref: string; ohms: number | 'OL' }[];
  symptoms: Symptom[];
  incident: Incident;
  text: string;
  probes: { from: string; to: string; position: string }[];
  estimate: { total: number; work: string };
  cause: string;
};

export type DemoCustomer = { name: string; email: string; phone: string; address: string };

const folder = 'content/demo';
const read = <T>(path: string): T => JSON.parse(readFileSync(`${folder}/${path}`, 'utf8')) as T;

export const demoBoards = (): DemoBoard[] =>
  readdirSync(`${folder}/boards`)
    .filter((f) => f.endsWith('.json'))
    .sort()
    .map((f) => read<DemoBoard>(`boards/${f}`));
export const demoScenarios = () => read<DemoScenario[]>('scenarios.json');
export const demoCustomers = () => read<DemoCustomer[]>('customers.json');
