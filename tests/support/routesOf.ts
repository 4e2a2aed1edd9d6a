import type { Express } from "express";

/** What Express keeps of a route or a router mounted by `use`; its own type hides it. */
interface Layer {
  route?: { path: string; methods: Record<string, boolean> };
  handle?: { stack?: Layer[] };
}

function routesIn(stack: readonly Layer[]): string[] {
  return stack.flatMap(({ route, handle }) => {
    if (route) return Object.keys(route.methods).map((method) => `${method.toUpperCase()} ${route.path}`);
    return handle?.stack ? routesIn(handle.stack) : [];
  });
}

/** Every registered route of the API, as `METHOD /path` under /api; the pages' own catch-all is left out. */
export function routesOf(app: Express): string[] {
  const { stack } = app.router as unknown as { stack: Layer[] };
  return routesIn(stack).filter((route) => !route.includes("{*"));
}
