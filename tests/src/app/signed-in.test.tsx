import { QueryClientProvider } from "@tanstack/react-query";
import { render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { expect, test } from "vitest";
import { routes } from "#src/app/router.tsx";
import { makeQueryClient } from "#src/lib/query-client.ts";
import { fakeServer, problem, SESSION } from "#tests/src/fake-server.ts";

function open(path: string) {
  const router = createMemoryRouter(routes, { initialEntries: [path] });
  render(
    <QueryClientProvider client={makeQueryClient()}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return router;
}

const NOTHING = {
  "GET /api/toolpaths": () => [],
  "GET /api/tunings": () => [],
  "GET /api/machines": () => [],
  "GET /api/profiles": () => [],
};

test("who is not signed in is sent to the sign-in page and back to where they wanted to go", async () => {
  let signedIn = false;
  fakeServer({
    "GET /api/session": () => (signedIn ? SESSION : problem(401, "signed-out")),
    "POST /api/session": () => {
      signedIn = true;
      return SESSION;
    },
    "GET /api/members": () => [],
  });
  const router = open("/members");
  const person = userEvent.setup();
  await person.type(await screen.findByLabelText("E-mail"), "lead@alderbay.example");
  await person.type(screen.getByLabelText("Password"), "a long password");
  await person.click(screen.getByRole("button", { name: "Sign in" }));
  await screen.findByRole("heading", { name: "Members" });
  expect(router.state.location.pathname).toBe("/members");
});

test("a wrong password is said in words and nothing typed is lost", async () => {
  fakeServer({
    "GET /api/session": () => problem(401, "signed-out"),
    "POST /api/session": () => problem(401, "wrong-credentials", { detail: "E-mail and password do not match." }),
  });
  open("/");
  const person = userEvent.setup();
  await person.type(await screen.findByLabelText("E-mail"), "lead@alderbay.example");
  await person.type(screen.getByLabelText("Password"), "wrong");
  await person.click(screen.getByRole("button", { name: "Sign in" }));
  expect((await screen.findByRole("alert")).textContent).toContain("E-mail and password do not match.");
  expect(screen.getByLabelText<HTMLInputElement>("E-mail").value).toBe("lead@alderbay.example");
});

test("an empty floor says what to do", async () => {
  fakeServer({ "GET /api/session": () => SESSION, ...NOTHING });
  open("/");
  await screen.findByText(/A toolpath is read for a machine, and there is none yet/);
  await screen.findByText(/No toolpath has come in yet/);
  expect(screen.getByText("Nothing for you to do.")).toBeDefined();
});

test("a list that can't be fetched says why and can be tried again", async () => {
  let broken = true;
  fakeServer({
    "GET /api/session": () => SESSION,
    "GET /api/members": () => (broken ? problem(500, "own-fault", { detail: "The database is busy." }) : []),
  });
  open("/members");
  const alert = await screen.findByRole("alert");
  expect(alert.textContent).toContain("The database is busy.");
  broken = false;
  await userEvent.setup().click(screen.getByRole("button", { name: "Try again" }));
  await screen.findByRole("region", { name: "Members" });
});

test("a session that ends in the middle of an edit costs nothing: sign in over the page, and it is saved", async () => {
  let signedIn = true;
  const saved: unknown[] = [];
  fakeServer({
    "GET /api/session": () => SESSION,
    "POST /api/session": () => {
      signedIn = true;
      return SESSION;
    },
    "GET /api/members": () => [],
    "POST /api/members": ({ body }) => {
      if (!signedIn) return problem(401, "signed-out");
      saved.push(body);
      return { id: "new" };
    },
  });
  open("/members");
  const person = userEvent.setup();
  await person.click(await screen.findByRole("button", { name: "Add a member" }));
  await person.type(screen.getByLabelText("E-mail"), "new@alderbay.example");
  await person.type(screen.getByLabelText("First password"), "a first password");
  signedIn = false;
  await person.click(screen.getByRole("button", { name: "Add" }));

  const dialog = await screen.findByRole("dialog", { name: "Sign in again" });
  expect(dialog.querySelector<HTMLInputElement>("[type=email]")?.value).toBe(SESSION.user.email);
  await person.type(screen.getByLabelText("Password"), "a long password");
  await person.click(screen.getByRole("button", { name: "Sign in" }));
  await waitFor(() => expect(saved).toHaveLength(1));
  expect(saved[0]).toMatchObject({ email: "new@alderbay.example", password: "a first password" });
});

test("after a change of page its heading has the focus, and the keys are told from every page", async () => {
  fakeServer({ "GET /api/session": () => SESSION, ...NOTHING, "GET /api/members": () => [] });
  open("/");
  const floor = await screen.findByRole("heading", { name: "Floor" });
  expect(document.activeElement).not.toBe(floor);
  const person = userEvent.setup();
  await person.click(screen.getByRole("link", { name: "Members" }));
  const heading = await screen.findByRole("heading", { name: "Members" });
  await waitFor(() => expect(document.activeElement).toBe(heading));
  await person.click(screen.getByRole("button", { name: "Keys" }));
  expect(screen.getByRole("dialog", { name: "Keys" }).textContent).toContain("undo");
});
