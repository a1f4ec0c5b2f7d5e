import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test, vi } from "vitest";
import { SAFETY_CHECKLIST } from "#shared/contract/safety-checklist.ts";
import { ChecklistDialog } from "#src/features/machines/checklist-dialog.tsx";
import { fakeServer } from "#tests/src/fake-server.ts";

test("nobody gets past the checklist before every item is ticked", async () => {
  const given = vi.fn();
  fakeServer({
    "GET /api/machines/*/versions/*/acknowledgement": () => ({ checklist: [SAFETY_CHECKLIST[0].id], at: null }),
    "PUT /api/machines/*/versions/*/acknowledgement": ({ body }) => {
      given(body);
      return { checklist: SAFETY_CHECKLIST.map(({ id }) => id), at: "2026-12-01T10:00:00Z" };
    },
  });
  const acknowledged = vi.fn();
  render(
    <QueryClientProvider client={new QueryClient()}>
      <ChecklistDialog
        machine={{ id: "m", version: 2, name: "Tern" }}
        onAcknowledged={acknowledged}
        onClose={vi.fn()}
      />
    </QueryClientProvider>,
  );
  const person = userEvent.setup();
  const done = await screen.findByRole("button", { name: "I have made sure" });
  for (const item of SAFETY_CHECKLIST.slice(1)) {
    expect(done).toHaveProperty("disabled", true);
    await person.click(screen.getByLabelText(item.text));
  }
  await person.click(done);
  await waitFor(() => expect(acknowledged).toHaveBeenCalledOnce());
  expect(given.mock.lastCall?.[0].checklist.sort()).toEqual(SAFETY_CHECKLIST.map(({ id }) => id).sort());
});
