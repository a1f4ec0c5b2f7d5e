import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { expect, test } from "vitest";
import { newProfile } from "#src/features/profiles/new-profile.ts";
import type { Remark } from "#src/lib/remarks.ts";
import { useDraft } from "#src/lib/use-draft.ts";
import { WriteTuned } from "#src/routes/write-tuned.tsx";
import { fakeServer, problem } from "#tests/src/fake-server.ts";

const PROFILE = newProfile("PEEK");
const VERSION = { id: "p", number: 1, createdAt: "", createdBy: "", document: PROFILE };

function Bench({ remarks }: { remarks?: Remark[] }) {
  const draft = useDraft("tune.p.1", VERSION);
  return (
    <>
      <button type="button" onClick={() => draft.change({ ...draft.document, polymer: "PPS" })}>
        Change
      </button>
      <WriteTuned readingId="r" profile={VERSION} draft={draft} checked={draft.document} ready remarks={remarks} />
    </>
  );
}

function open(remarks?: Remark[]) {
  const router = createMemoryRouter(
    [
      { path: "/", element: <Bench remarks={remarks} /> },
      { path: "/tunings/:id", element: <h1>Written</h1> },
    ],
    { initialEntries: ["/"] },
  );
  render(
    <QueryClientProvider client={new QueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return userEvent.setup();
}

test("an unchanged profile is tuned with as it is", async () => {
  const { seen } = fakeServer({
    "POST /api/tunings": ({ body }) => {
      expect(body).toEqual({ readingId: "r", profileId: "p", profileVersion: 1 });
      return { id: "t" };
    },
  });
  const person = open();
  await person.click(screen.getByRole("button", { name: "Write tuned file" }));
  await screen.findByRole("heading", { name: "Written" });
  expect(seen).toEqual(["POST /api/tunings"]);
});

test("a changed profile becomes a version first, and only once, however often writing has to be tried", async () => {
  const tuned: unknown[] = [];
  const { seen } = fakeServer({
    "POST /api/profiles/p/versions": ({ body }) => {
      expect(body).toMatchObject({ basedOn: 1, document: { polymer: "PPS" }, note: "Trial" });
      return { ...VERSION, number: 2 };
    },
    "POST /api/tunings": ({ body }) => {
      tuned.push(body);
      return tuned.length === 1 ? problem(503, "busy", { detail: "The server is busy." }) : { id: "t" };
    },
  });
  const person = open();
  await person.click(screen.getByRole("button", { name: "Change" }));
  await person.click(screen.getByRole("button", { name: "Write tuned file" }));
  await person.type(screen.getByLabelText("Why"), "Trial");
  const again = () => screen.getAllByRole("button", { name: "Write tuned file" }).at(-1)!;
  await person.click(again());
  await screen.findByText("The server is busy.");
  await person.click(again());
  await screen.findByRole("heading", { name: "Written" });
  expect(seen.filter((call) => call.includes("versions"))).toHaveLength(1);
  expect(tuned).toEqual(Array(2).fill({ readingId: "r", profileId: "p", profileVersion: 2 }));
  expect(localStorage.length).toBe(0);
});

test("warnings are told again before anything is written, advice is not", async () => {
  const { seen } = fakeServer({ "POST /api/tunings": () => ({ id: "t" }) });
  const person = open([
    { severity: "warning", message: "This file was not sliced for PEEK." },
    { severity: "advice", layer: 3, message: "Layer 3 stays warm." },
  ]);
  await person.click(screen.getByRole("button", { name: "Write tuned file" }));
  expect(seen).toEqual([]);
  const dialog = within(screen.getByRole("dialog", { name: "Before the file is written" }));
  expect(dialog.getByText(/not sliced for PEEK/)).toBeTruthy();
  expect(dialog.queryByText(/stays warm/)).toBeNull();
  await person.click(dialog.getByRole("button", { name: "Write tuned file" }));
  await screen.findByRole("heading", { name: "Written" });
  expect(seen).toEqual(["POST /api/tunings"]);
});
