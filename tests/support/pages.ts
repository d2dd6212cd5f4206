import type { ServerBuild } from "react-router";

export type BuiltPage = { pattern: string; routeId: string; module: Record<string, unknown> };

/** Every page of the build with its whole pattern, as the access table names it. */
export function pagesOf(build: ServerBuild): BuiltPage[] {
  const routes = build.routes;
  function segments(id: string | undefined): string[] {
    const route = id === undefined ? undefined : routes[id];
    if (!route) return [];
    return [...segments(route.parentId), ...(route.path === undefined || route.path === "" ? [] : [route.path])];
  }
  return Object.values(routes).flatMap((route) => {
    if (!route || route.id === "root") return [];
    return [{ pattern: `/${segments(route.id).join("/")}`, routeId: route.id, module: { ...route.module } }];
  });
}
