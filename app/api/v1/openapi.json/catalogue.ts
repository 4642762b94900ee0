import type { RouteCatalogue } from "@/lib/api/openapi";

/** Every route file under /api/v1 but the description itself. A test walks the folders and fails for one that is missing. */
export const catalogue: RouteCatalogue = {
  "/api/v1/checks": () => import("../checks/route"),
  "/api/v1/comparisons": () => import("../comparisons/route"),
  "/api/v1/comparisons/{comparisonId}": () => import("../comparisons/[comparisonId]/route"),
  "/api/v1/computations": () => import("../computations/route"),
  "/api/v1/design-revisions/{revisionId}": () => import("../design-revisions/[revisionId]/route"),
  "/api/v1/design-revisions/{revisionId}/gains": () => import("../design-revisions/[revisionId]/gains/route"),
  "/api/v1/design-revisions/{revisionId}/responses": () => import("../design-revisions/[revisionId]/responses/route"),
  "/api/v1/designs/{designId}": () => import("../designs/[designId]/route"),
  "/api/v1/designs/{designId}/archive": () => import("../designs/[designId]/archive/route"),
  "/api/v1/designs/{designId}/duplicate": () => import("../designs/[designId]/duplicate/route"),
  "/api/v1/designs/{designId}/revisions": () => import("../designs/[designId]/revisions/route"),
  "/api/v1/plants": () => import("../plants/route"),
  "/api/v1/plants/{plantId}": () => import("../plants/[plantId]/route"),
  "/api/v1/plants/{plantId}/archive": () => import("../plants/[plantId]/archive/route"),
  "/api/v1/plants/{plantId}/designs": () => import("../plants/[plantId]/designs/route"),
  "/api/v1/plants/{plantId}/difference": () => import("../plants/[plantId]/difference/route"),
  "/api/v1/plants/{plantId}/duplicate": () => import("../plants/[plantId]/duplicate/route"),
  "/api/v1/plants/{plantId}/revisions": () => import("../plants/[plantId]/revisions/route"),
  "/api/v1/plants/{plantId}/revisions/{revisionId}": () => import("../plants/[plantId]/revisions/[revisionId]/route"),
  "/api/v1/plants/{plantId}/revisions/{revisionId}/checks": () =>
    import("../plants/[plantId]/revisions/[revisionId]/checks/route"),
  "/api/v1/templates": () => import("../templates/route"),
  "/api/v1/templates/{templateId}": () => import("../templates/[templateId]/route"),
  "/api/v1/templates/{templateId}/archive": () => import("../templates/[templateId]/archive/route"),
  "/api/v1/templates/{templateId}/start": () => import("../templates/[templateId]/start/route"),
};
