import type { Express } from 'express'
import { policyOf } from './allow.ts'
import type { Policy } from '../policies/policy.ts'

interface Layer {
  route?: { path: string; methods: Record<string, boolean>; stack: { handle: unknown; method: string }[] }
  handle?: { stack?: Layer[] }
}

export interface DeclaredRoute {
  method: string
  path: string
  policy: Policy | null
}

/** Every route of the app with its policy; read from the live route table. Routers are mounted flat under /api. */
export const routeTable = (app: Express): DeclaredRoute[] => {
  const walk = (layers: Layer[], prefix: string): DeclaredRoute[] =>
    layers.flatMap((layer) => {
      if (layer.route) {
        const { path, stack } = layer.route
        const methods = [...new Set(stack.map((part) => part.method))]
        return methods.map((method) => ({
          method: method.toUpperCase(),
          path: `${prefix}${path}`,
          policy: policyOf(stack.find((part) => part.method === method)?.handle),
        }))
      }
      return layer.handle?.stack ? walk(layer.handle.stack, '/api') : []
    })
  return walk((app.router as unknown as { stack: Layer[] }).stack, '')
}

/** A route without a declared policy stops the boot. */
export const assertPolicies = (app: Express): void => {
  const bare = routeTable(app).filter((route) => route.policy === null)
  if (bare.length > 0)
    throw new Error(
      `No policy is declared for: ${bare.map((route) => `${route.method} ${route.path}`).join(', ')}`,
    )
}
