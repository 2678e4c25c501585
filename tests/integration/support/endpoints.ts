import { readdirSync } from 'node:fs';
import path from 'node:path';
import type { EndpointDefinition } from '@shared/contracts/defineEndpoint';

const folder = path.resolve(import.meta.dirname, '../../../shared/contracts');

const isEndpoint = (value: unknown): value is EndpointDefinition =>
  typeof value === 'object' && value !== null && 'path' in value && 'method' in value && 'auth' in value;

const contracts = readdirSync(folder).filter((name) => name.endsWith('.contract.ts'));
const modules = await Promise.all(
  contracts.map((name) => import(/* @vite-ignore */ path.join(folder, name)) as Promise<Record<string, unknown>>),
);

/** Every endpoint of the contracts: a new one is in the tests of all of them without being added anywhere. */
export const allEndpoints: EndpointDefinition[] = modules
  .flatMap((module) => Object.values(module))
  .filter(isEndpoint)
  .sort((a, b) => `${a.path} ${a.method}`.localeCompare(`${b.path} ${b.method}`));

/** `POST /api/jobs/:id/joints`. */
export const nameOf = ({ method, path: address }: EndpointDefinition): string => `${method} ${address}`;
