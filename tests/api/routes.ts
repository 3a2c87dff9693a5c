import { readdirSync } from 'node:fs'
import { resolve } from 'node:path'
import type { routeParams } from '../helpers/test-server'

export type Handler = (request: Request, route: ReturnType<typeof routeParams>) => Response | Promise<Response>
export const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'] as const

/** Files below a folder whose path matches, from the project root. */
export const filesBelow = (folder: string, pattern: RegExp) =>
  readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .map((file) => `${folder}/${file}`)
    .filter((file) => pattern.test(file))
    .sort()

/** Every route file below app/api with the handlers that it exports, as the server would mount them. */
export async function findRoutes(): Promise<Map<string, Partial<Record<string, Handler>>>> {
  const found = new Map<string, Partial<Record<string, Handler>>>()
  for (const file of filesBelow('app', /\/route\.\w+$/)) {
    const handlers = (await import(/* @vite-ignore */ resolve(file))) as Partial<Record<string, Handler>>
    found.set(
      `/${file
        .replace(/^app\//, '')
        .replace(/\/route\.\w+$/, '')
        .replaceAll(/\([^)]*\)\//g, '')}`,
      handlers,
    )
  }
  return found
}
