import { readdirSync } from 'node:fs';
import path from 'node:path';
import type { Endpoint } from '#shared/api/endpoint.ts';

export type AnyEndpoint = Endpoint<never, unknown>;

function isEndpoint(value: unknown): value is AnyEndpoint {
  return typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'access' in value;
}

/** Every endpoint that any file of `shared/api` defines, by name: a new one is in every table at once. */
export async function everyEndpoint(): Promise<{ name: string; endpoint: AnyEndpoint }[]> {
  const folder = path.resolve(import.meta.dirname, '../../shared/api');
  const found: { name: string; endpoint: AnyEndpoint }[] = [];
  for (const file of readdirSync(folder).sort()) {
    const module: Record<string, unknown> = await import(path.join(folder, file));
    for (const [group, value] of Object.entries(module)) {
      if (typeof value !== 'object' || value === null) continue;
      for (const [key, endpoint] of Object.entries(value)) {
        if (isEndpoint(endpoint)) found.push({ name: `${group}.${key}`, endpoint });
      }
    }
  }
  return found;
}
