import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test, vi } from "vitest";
import type { Profile } from "#shared/formats/profile.ts";
import { EditDocument } from "#src/features/documents/edit-document.tsx";
import { PROFILES } from "#src/features/documents/kinds.ts";
import { newProfile } from "#src/features/profiles/new-profile.ts";
import { fakeServer, problem } from "#tests/src/fake-server.ts";

const named = (name: string): Profile => ({ ...newProfile("PEEK"), name });

/** An editor of the name alone is enough to see what becomes of a draft. */
function open(
  base: { id?: string; number: number; document: Profile } = { id: "p", number: 1, document: named("Cap") },
) {
  const onSaved = vi.fn();
  render(
    <QueryClientProvider client={new QueryClient()}>
      <EditDocument
        kind={PROFILES}
        base={base}
        editor={(draft, change) => (
          <input
            aria-label="Name"
            value={draft.name}
            onChange={({ target }) => change({ ...draft, name: target.value })}
          />
        )}
        onSaved={onSaved}
      />
    </QueryClientProvider>,
  );
  return { onSaved, person: userEvent.setup() };
}

async function save(person: ReturnType<typeof userEvent.setup>): Promise<void> {
  await person.click(screen.getByRole("button", { name: "Save as a new version" }));
  await person.type(screen.getByLabelText("Why"), "Trial 7");
  await person.click(screen.getByRole("button", { name: "Save" }));
}

test("a change is saved as the next version, with its reason, and no draft stays behind", async () => {
  const sent: unknown[] = [];
  fakeServer({
    "POST /api/profiles/p/versions": ({ body }) => {
      sent.push(body);
      return { id: "p", number: 2, document: named("Cap 2") };
    },
  });
  const { onSaved, person } = open();
  await person.type(screen.getByLabelText("Name"), " 2");
  await save(person);
  await waitFor(() => expect(onSaved).toHaveBeenCalledOnce());
  expect(sent).toEqual([{ basedOn: 1, document: named("Cap 2"), note: "Trial 7" }]);
  expect(localStorage.length).toBe(0);
});

test("when somebody else was faster nothing is lost: both are compared, and the draft goes on top of theirs", async () => {
  const based: unknown[] = [];
  fakeServer({
    "POST /api/profiles/p/versions": ({ body }) => {
      const { basedOn } = body as { basedOn: number };
      based.push(basedOn);
      return basedOn === 2 ? { id: "p", number: 3, document: named("Mine") } : problem(409, "version-conflict");
    },
    "GET /api/profiles/p": () => ({
      id: "p",
      name: "Theirs",
      versions: [2, 1].map((number) => ({
        number,
        createdAt: "2026-12-01T10:00:00Z",
        createdBy: "lead@alderbay.example",
      })),
    }),
    "GET /api/profiles/p/versions/2": () => ({ id: "p", number: 2, document: named("Theirs") }),
  });
  const { onSaved, person } = open();
  await person.clear(screen.getByLabelText("Name"));
  await person.type(screen.getByLabelText("Name"), "Mine");
  await save(person);
  await screen.findByText(/lead@alderbay.example has saved version 2 since/);
  await person.click(screen.getByRole("button", { name: "Compare with yours" }));
  const table = await screen.findByRole("region", { name: "Version 2 and Yours" });
  expect(table.textContent).toContain("Theirs");
  expect(table.textContent).toContain("Mine");
  await person.click(screen.getByRole("button", { name: "Close" }));

  await person.click(screen.getByRole("button", { name: "Put yours on top of it" }));
  expect(screen.getByLabelText<HTMLInputElement>("Name").value).toBe("Mine");
  await save(person);
  await waitFor(() => expect(onSaved).toHaveBeenCalledOnce());
  expect(based).toEqual([1, 2]);
});

test("a draft that is no valid document can't be saved, and says where it is wrong", async () => {
  fakeServer({});
  const { person } = open();
  await person.clear(screen.getByLabelText("Name"));
  expect(screen.getByRole("alert").textContent).toContain("Name is empty. Give it a name");
  expect(screen.getByRole("button", { name: "Save as a new version" })).toHaveProperty("disabled", true);
});

test("of a new document nothing is said to be missing before it is to be saved", async () => {
  fakeServer({});
  const { person } = open({ number: 0, document: named("") });
  expect(screen.queryByRole("alert")).toBeNull();
  await person.click(screen.getByRole("button", { name: "Save" }));
  expect(screen.getByRole("alert").textContent).toContain("Name is empty. Give it a name");
  expect(screen.queryByLabelText("Why")).toBeNull();
  await person.type(screen.getByLabelText("Name"), "Cap");
  expect(screen.queryByRole("alert")).toBeNull();
  await person.click(screen.getByRole("button", { name: "Save" }));
  expect(screen.getByLabelText("Why")).toBeTruthy();
});
