import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { beforeEach, expect, test, vi } from "vitest";
import { BringIn } from "#src/features/toolpaths/bring-in.tsx";
import { sendToolpath } from "#src/features/toolpaths/queries.ts";

vi.mock("#src/features/toolpaths/queries.ts", () => ({
  sendToolpath: vi.fn(() => new Promise(() => {})),
  toolpathQuery: (id: string) => ({ queryKey: ["toolpaths", id] }),
}));

const machine = (id: string, name: string) => ({
  id,
  name,
  versions: 1,
  latest: { number: 1, createdAt: "2026-12-01T10:00:00Z", createdBy: "" },
});
const TWO = [machine("f", "Fulmar"), machine("t", "Tern")];

function open(userId = "u", machines = TWO) {
  return render(
    <QueryClientProvider client={new QueryClient()}>
      <BringIn machines={machines} userId={userId} onArrived={vi.fn()} />
    </QueryClientProvider>,
  );
}

const chosen = () => screen.getByLabelText<HTMLSelectElement>("Machine").value;
const bring = (person: ReturnType<typeof userEvent.setup>) =>
  person.upload(screen.getByLabelText("Toolpath files"), new File(["G1 X1"], "part.gcode"));
const sentTo = () => vi.mocked(sendToolpath).mock.lastCall?.[0];

beforeEach(() => vi.clearAllMocks());

test("with several machines and no choice yet nothing is guessed: the file waits until it is said", async () => {
  const person = userEvent.setup();
  open();
  expect(chosen()).toBe("");
  await bring(person);
  expect(sendToolpath).not.toHaveBeenCalled();
  await person.click(screen.getByRole("button", { name: "Tern" }));
  expect(sentTo()).toBe("t");
  expect(chosen()).toBe("t");
});

test("the last machine is remembered for the person who chose it, and for nobody else", async () => {
  const person = userEvent.setup();
  const { unmount } = open();
  await person.selectOptions(screen.getByLabelText("Machine"), "Tern");
  unmount();
  open().unmount();
  open("u");
  expect(chosen()).toBe("t");
  await bring(person);
  expect(sentTo()).toBe("t");
  screen.getByLabelText("Machine");
  open("somebody else");
  expect(screen.getAllByLabelText<HTMLSelectElement>("Machine")[1].value).toBe("");
});

test("the only machine needs no choice, and one that is gone is not taken", async () => {
  localStorage.setItem("quenchline.machine.u", "gone");
  const { unmount } = open("u", [machine("o", "Only")]);
  expect(chosen()).toBe("o");
  unmount();
  open();
  expect(chosen()).toBe("");
});
