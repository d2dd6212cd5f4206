/** What may import what. Each rule is one line of the map in DEVELOPERS.md. */
const leaf = (name) => `^app/services/${name}\\.server\\.ts$`;

module.exports = {
  forbidden: [
    { name: "no-cycles", severity: "error", from: {}, to: { circular: true } },
    {
      name: "domain-pure",
      severity: "error",
      from: { path: "^app/domain" },
      to: { pathNot: ["^app/domain", "^node_modules/simple-statistics"] },
    },
    {
      name: "statistics-in-one-place",
      severity: "error",
      from: { path: "^app", pathNot: "^app/domain/stats" },
      to: { path: "^node_modules/simple-statistics" },
    },
    {
      name: "domain-order-floor",
      severity: "error",
      from: { path: "^app/domain/(units|dates|readings|stats)" },
      to: { path: "^app/domain/(fleet|calibration|season|severity|disclosure|peers)/" },
    },
    {
      name: "domain-order-trade",
      severity: "error",
      from: { path: "^app/domain/(fleet|calibration|season|severity)/" },
      to: { path: "^app/domain/(disclosure|peers)/" },
    },
    {
      name: "domain-order-disclosure",
      severity: "error",
      from: { path: "^app/domain/disclosure/" },
      to: { path: "^app/domain/peers/" },
    },
    {
      name: "models-below",
      severity: "error",
      from: { path: "^app/models" },
      to: { path: "^app", pathNot: ["^app/models", "^app/lib/db\\.server\\.ts$", "^app/domain", "^app/context\\.ts$"] },
    },
    {
      name: "services-do-not-look-up",
      severity: "error",
      from: { path: "^app/services" },
      to: { path: ["^app/(routes|components|middleware|offline)", "^node_modules/react(-dom)?/"] },
    },
    {
      name: "leaf-services",
      severity: "error",
      from: { path: [leaf("audit"), leaf("outbox")] },
      to: { path: "^app/services" },
    },
    {
      name: "routes-through-services",
      severity: "error",
      from: { path: "^app/routes/" },
      to: { path: ["^app/models", "^app/lib/db\\.server\\.ts$", "^node_modules/sequelize", "^app/routes/"] },
    },
    {
      name: "components-draw-only",
      severity: "error",
      from: { path: "^app/components" },
      to: { path: ["^app/(routes|services|models|middleware)", "\\.server\\."], pathNot: "^app/components/charts/" },
    },
    {
      name: "routes-are-roots",
      severity: "error",
      from: { pathNot: ["^app/routes\\.ts$", "^tests"] },
      to: { path: "^app/routes/" },
    },
    {
      name: "peers-see-editions-only",
      severity: "error",
      from: { path: "^app/routes/(peers|workshops|dataset|api)/" },
      to: {
        path: "^app/services/",
        pathNot: "^app/services/(editions|workshops|dataset|tokens|audit|tick|terms)\\.server\\.ts$",
      },
    },
    {
      name: "raw-figures-have-few-readers",
      severity: "error",
      from: {
        path: "^app/",
        pathNot: ["^app/services/(season-figures|review|peer-figures|uploads)(\\.server\\.ts|/)", "^app/models/"],
      },
      to: { path: "^app/models/season-figure" },
    },
    {
      name: "one-owner-plot",
      severity: "error",
      from: { path: "^app", pathNot: "^app/components/charts" },
      to: { path: "^node_modules/(@observablehq/plot|linkedom)" },
    },
    {
      name: "one-owner-csv",
      severity: "error",
      from: { path: "^app", pathNot: "^app/lib/csv" },
      to: { path: "^node_modules/csv-" },
    },
    {
      name: "one-owner-workbook",
      severity: "error",
      from: { path: "^app", pathNot: "^app/lib/workbook" },
      to: { path: "^node_modules/(exceljs|yauzl)" },
    },
    {
      name: "one-owner-mail",
      severity: "error",
      from: { path: "^app", pathNot: "^app/lib/mailer" },
      to: { path: "^node_modules/nodemailer" },
    },
    {
      name: "one-owner-sign-in",
      severity: "error",
      from: { path: "^app", pathNot: "^app/services/(sign-in|sessions)" },
      to: { path: "^node_modules/(remix-auth|jose)" },
    },
    {
      name: "one-owner-sequelize",
      severity: "error",
      from: { path: "^app", pathNot: "^app/(models|services|lib/db\\.server\\.ts)" },
      to: { path: "^node_modules/sequelize" },
    },
    {
      name: "lib-is-the-floor",
      severity: "error",
      from: { path: ["^app/lib", "^app/context\\.ts$"] },
      to: {
        path: "^app",
        pathNot: ["^app/lib", "^app/domain/(units|dates|readings|file-problem|severity/weather-day)"],
      },
    },
    { name: "app-border", severity: "error", from: { path: "^app" }, to: { path: "^(tests|idp|scripts|data)/" } },
    { name: "idp-border", severity: "error", from: { path: "^idp" }, to: { path: "^app" } },
    { name: "migration-border", severity: "error", from: { path: "^data" }, to: { path: "^app" } },
    {
      name: "no-orphans",
      severity: "error",
      from: {
        orphan: true,
        path: "^app",
        pathNot: ["^app/(root|routes|entry\\.server|entry\\.client)\\.tsx?$", "^app/routes/"],
      },
      to: {},
    },
  ],
  options: {
    tsConfig: { fileName: "tsconfig.json" },
    tsPreCompilationDeps: true,
    doNotFollow: { path: "node_modules" },
    exclude: { path: ["\\.react-router", "^build"] },
    enhancedResolveOptions: { exportsFields: ["exports"], conditionNames: ["import", "node", "default", "types"] },
  },
};
