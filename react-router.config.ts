import type { Config } from "@react-router/dev/config";

export default {
  ssr: true,
  // The whole route map ships with the entry: the app is small, and the manifest endpoint is one less thing to guard.
  routeDiscovery: { mode: "initial" },
  future: {
    v8_middleware: true,
    v8_splitRouteModules: true,
    v8_viteEnvironmentApi: true,
    v8_passThroughRequests: true,
    v8_trailingSlashAwareDataRequests: true,
  },
} satisfies Config;
