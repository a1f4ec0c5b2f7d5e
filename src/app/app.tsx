import { QueryClientProvider } from "@tanstack/react-query";
import { useState } from "react";
import { RouterProvider } from "react-router-dom";
import { makeRouter } from "#src/app/router.tsx";
import { makeQueryClient } from "#src/lib/query-client.ts";

export function App() {
  const [client] = useState(makeQueryClient);
  const [router] = useState(makeRouter);
  return (
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  );
}
