import type { ComponentType } from "react";
import { createBrowserRouter, type RouteObject } from "react-router-dom";
import { PageFault } from "#src/app/page-fault.tsx";
import { SignedIn } from "#src/app/signed-in.tsx";
import { MACHINES, POLYMERS, PROFILES } from "#src/features/documents/kinds.ts";
import { Floor } from "#src/routes/floor.tsx";
import { NotFound } from "#src/routes/not-found.tsx";
import { SignIn } from "#src/routes/sign-in.tsx";
import { Loading } from "#src/ui/states.tsx";

/** A page whose code is fetched when it is first opened. */
const later = (path: string, load: () => Promise<ComponentType>): RouteObject => ({
  path,
  lazy: async () => ({ Component: await load() }),
});

const documentPages = [MACHINES, PROFILES, POLYMERS].flatMap((kind): RouteObject[] => [
  {
    path: kind.plural,
    lazy: async () => {
      const { DocumentsPage } = await import("#src/routes/documents.tsx");
      return { element: <DocumentsPage kind={kind as never} /> };
    },
  },
  {
    path: `${kind.plural}/:id/compare`,
    lazy: async () => {
      const { CompareVersions } = await import("#src/routes/compare-versions.tsx");
      return { element: <CompareVersions kind={kind as never} /> };
    },
  },
]);

export const routes: RouteObject[] = [
  { path: "/sign-in", Component: SignIn, ErrorBoundary: PageFault },
  {
    path: "/",
    Component: SignedIn,
    ErrorBoundary: PageFault,
    HydrateFallback: () => <Loading />,
    children: [
      {
        ErrorBoundary: PageFault,
        children: [
          { index: true, Component: Floor },
          later("toolpaths/:id", async () => (await import("#src/routes/toolpath.tsx")).ToolpathPage),
          later("readings/:id/tune", async () => (await import("#src/routes/tune.tsx")).TunePage),
          later("readings/:id/compare", async () => (await import("#src/routes/compare-plans.tsx")).ComparePlansPage),
          later("tunings/:id", async () => (await import("#src/routes/tuning.tsx")).TuningPage),
          ...documentPages,
          later("machines/new", async () => (await import("#src/routes/machine-edit.tsx")).NewMachine),
          later("machines/:id", async () => (await import("#src/routes/machine.tsx")).MachinePage),
          later("machines/:id/edit", async () => (await import("#src/routes/machine-edit.tsx")).EditMachine),
          later("profiles/new", async () => (await import("#src/routes/profile-edit.tsx")).NewProfile),
          later("profiles/:id", async () => (await import("#src/routes/profile.tsx")).ProfilePage),
          later("profiles/:id/edit", async () => (await import("#src/routes/profile-edit.tsx")).EditProfile),
          later("polymers/new", async () => (await import("#src/routes/polymer-edit.tsx")).NewPolymer),
          later("polymers/:id", async () => (await import("#src/routes/polymer.tsx")).PolymerPage),
          later("polymers/:id/edit", async () => (await import("#src/routes/polymer-edit.tsx")).EditPolymer),
          later("members", async () => (await import("#src/routes/members.tsx")).MembersPage),
          { path: "*", Component: NotFound },
        ],
      },
    ],
  },
];

export const makeRouter = () => createBrowserRouter(routes);
