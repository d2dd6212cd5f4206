import { index, type RouteConfig, route } from "@react-router/dev/routes";

export default [
  index("routes/home.tsx"),
  route("protection", "routes/protection.tsx"),
  route("login", "routes/login.tsx"),
  route("auth/start", "routes/auth.start.ts"),
  route("auth/callback", "routes/auth.callback.ts"),
  route("logout", "routes/logout.ts"),
  route("invitations/:token", "routes/invitation.tsx"),
  route("healthz", "routes/healthz.ts"),
  route("readyz", "routes/readyz.ts"),
  route("components", "routes/components.tsx"),
  route("bare", "routes/bare.tsx"),

  route("today", "routes/today/today.tsx"),
  route("account", "routes/account/account.tsx"),

  route("fleet", "routes/fleet/fleet.tsx"),
  route("fleet/trucks/new", "routes/fleet/new-truck.tsx"),
  route("fleet/due", "routes/fleet/due.tsx"),
  route("fleet/cards", "routes/fleet/cards.tsx"),
  route("fleet/bands", "routes/fleet/bands.tsx"),
  route("fleet/export", "routes/fleet/export.ts"),
  route("fleet/calibrations/:calibrationId", "routes/fleet/calibration.tsx"),
  route("fleet/calibrations/:calibrationId/card", "routes/fleet/card.tsx"),
  route("fleet/worksheets", "routes/fleet/worksheets.tsx"),
  route("fleet/worksheets/kit", "routes/fleet/worksheet-kit.ts"),
  route("fleet/worksheets/sync", "routes/fleet/worksheet-sync.ts"),
  route("fleet/worksheets/:clientRef", "routes/fleet/worksheet.tsx"),
  route("fleet/:truckId", "routes/fleet/truck.tsx"),
  route("fleet/:truckId/edit", "routes/fleet/edit-truck.tsx"),
  route("fleet/:truckId/work", "routes/fleet/work.tsx"),

  route("season", "routes/season/latest-season.ts"),
  route("season/:seasonStartYear", "routes/season/season.tsx"),
  route("uploads", "routes/season/uploads.tsx"),
  route("uploads/templates/:kind", "routes/season/upload-template.ts"),
  route("uploads/:uploadId", "routes/season/upload.tsx"),
  route("uploads/:uploadId/columns", "routes/season/upload-columns.tsx"),
  route("uploads/:uploadId/problems", "routes/season/upload-problems.ts"),
  route("uploads/:uploadId/file", "routes/season/upload-file.ts"),

  route("peers", "routes/peers/peers.tsx"),
  route("peers/table", "routes/peers/peer-table.ts"),

  route("workshops", "routes/workshops/workshops.tsx"),
  route("workshops/:workshopId", "routes/workshops/workshop.tsx"),
  route("workshops/:workshopId/boards/:position", "routes/workshops/board.tsx"),

  route("dataset", "routes/dataset/dataset.tsx"),
  route("dataset/tokens", "routes/dataset/tokens.tsx"),
  route("dataset/editions/:editionId/:file", "routes/dataset/edition-file.ts"),

  route("network", "routes/network/network.tsx"),
  route("network/review", "routes/network/review-queue.tsx"),
  route("network/review/:figureId", "routes/network/review-figure.tsx"),
  route("network/editions", "routes/network/editions.tsx"),
  route("network/bands", "routes/network/bands.tsx"),
  route("network/people", "routes/network/people.tsx"),
  route("network/mail", "routes/network/mail.tsx"),
  route("network/audit", "routes/network/audit.tsx"),

  route("api/v1/editions", "routes/api/editions.ts"),
  route("api/v1/editions/:editionId/:file", "routes/api/edition-file.ts"),
  route("internal/tick", "routes/api/tick.ts"),

  route("*", "routes/not-found.tsx"),
] satisfies RouteConfig;
