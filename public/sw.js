// Keeps the worksheet's program on the phone: one page without anybody's data, its scripts, styles and fonts. What is
// typed lives in the browser's own store, and no page with a town's figures is ever kept here.
const build = "__BUILD__";
const cacheName = `worksheet-${build}`;
const scope = "/fleet/worksheets";
const shell = `${scope}/shell`;
/** What the phone has by itself, shown in place of the list when there is no signal. */
const onPhone = `${scope}/phone`;

function assetsIn(text) {
  return [...new Set(text.match(/\/assets\/[\w.-]+/g) ?? [])];
}

async function install() {
  const cache = await caches.open(cacheName);
  // Asked for without the session, so that nothing personal can be in it.
  const page = await fetch(shell, { credentials: "omit", cache: "no-store" });
  if (!page.ok) throw new Error(`The worksheet's page answered ${page.status}.`);
  const assets = assetsIn(await page.clone().text());
  await cache.put(shell, page);
  await cache.addAll([...assets, "/favicon.svg"]);
  for (const style of assets.filter((asset) => asset.endsWith(".css"))) {
    const sheet = await cache.match(style);
    await cache.addAll(assetsIn(await sheet.text()).filter((asset) => asset.endsWith(".woff2")));
  }
  await self.skipWaiting();
}

/** The build before this one stays, for pages that are open with it. */
async function activate() {
  const names = (await caches.keys()).filter((name) => name.startsWith("worksheet-") && name !== cacheName);
  await Promise.all(names.slice(0, -1).map((name) => caches.delete(name)));
  await self.clients.claim();
}

async function keptShell(request) {
  const cache = await caches.open(cacheName);
  return (await cache.match(shell, { ignoreVary: true })) ?? fetch(request);
}

async function listOrPhone(request) {
  try {
    return await fetch(request);
  } catch {
    return Response.redirect(onPhone, 302);
  }
}

async function keptOrFetched(request) {
  return (await caches.match(request, { ignoreVary: true })) ?? fetch(request);
}

self.addEventListener("install", (event) => event.waitUntil(install()));
self.addEventListener("activate", (event) => event.waitUntil(activate()));
self.addEventListener("fetch", (event) => {
  const { request } = event;
  const { origin, pathname } = new URL(request.url);
  if (request.method !== "GET" || origin !== self.location.origin) return;
  if (pathname.startsWith("/assets/") || pathname === "/favicon.svg") event.respondWith(keptOrFetched(request));
  if (request.mode !== "navigate") return;
  if (pathname === scope) event.respondWith(listOrPhone(request));
  else if (/^\/fleet\/worksheets\/(phone|new|shell|[0-9a-f-]{36})$/.test(pathname)) event.respondWith(keptShell(request));
});
