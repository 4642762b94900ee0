/** Who may import whom; DEVELOPERS.md gives the same as a table. `never` names what is refused, `only` what is allowed. */
const only = (name, from, also) => ({ name, severity: "error", from: { path: from }, to: { pathNot: [from, ...also] } });
const never = (name, from, to) => ({ name, severity: "error", from: { path: from }, to: { path: to } });

module.exports = {
  forbidden: [
    // A cycle of types alone is gone once compiled.
    { name: "no-cycles", severity: "error", from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ["type-only"] } } },
    { name: "nothing-missing", severity: "error", from: {}, to: { couldNotResolve: true } },
    only("control-is-pure", "^control/", ["node_modules/ml-matrix/", "node_modules/mathjs/"]),
    never("formulas-have-one-door", "^(?!control/expression/)", ["node_modules/mathjs/"]),
    only("schemas-are-isomorphic", "^lib/schemas/", ["^control/", "node_modules/zod/"]),
    only("client-is-isomorphic", "^lib/client/", ["^control/", "^lib/schemas/", "node_modules/zod/"]),
    never("db-knows-no-service", "^db/", ["^lib/(?!env|schemas/)", "^app/", "^components/"]),
    never("services-know-no-framework", "^lib/(services|permissions)/", [
      "node_modules/(next|next-auth|react)/",
      "^lib/api/",
      "^(app|components)/",
    ]),
    never("tasks-know-no-framework", "^lib/(jobs|mail|files)/", [
      "node_modules/(next|next-auth|react)/",
      "^lib/api/",
      "^(app|components)/",
    ]),
    never("requests-hold-no-query", "^lib/(api|auth)/", ["^db/queries/", "^(app|components)/"]),
    never("screens-and-routes-hold-no-query", "^(app|components)/", ["^db/", "node_modules/(drizzle-orm|pg)/"]),
    never("components-know-no-service", "^components/", ["^lib/(?!schemas/|client/|commands/demo-accounts)", "^app/"]),
    never("commands-know-no-screen", "^lib/commands/", ["^(app|components)/"]),
    {
      name: "browser-never-reaches-the-database",
      severity: "error",
      from: { path: "^components/" },
      to: { path: "^db/", reachable: true },
    },
  ],
  options: {
    doNotFollow: { path: "node_modules" },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: "tsconfig.json" },
    enhancedResolveOptions: { exportsFields: ["exports"], conditionNames: ["import", "require", "node", "default", "types"] },
  },
};
