import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import type { Reading, Toolpath } from "#shared/contract/toolpaths.ts";
import { sendToolpath, toolpathQuery } from "#src/features/toolpaths/queries.ts";
import { asProblem, type Problem } from "#src/lib/problem.ts";

/** A file on its way to the server. It leaves the list once it has arrived. */
export interface Underway {
  key: number;
  file: File;
  sent: number;
  machineId: string;
  problem?: Problem;
}

/** Sends files one after the other, so that each has the whole line to itself. */
export function useUploads(onArrived: (arrived: { toolpath: Toolpath; reading: Reading }, last: boolean) => void) {
  const client = useQueryClient();
  const [uploads, setUploads] = useState<Underway[]>([]);
  const aborts = useRef(new Map<number, AbortController>());
  const tail = useRef(Promise.resolve());
  const nextKey = useRef(1);
  const change = (key: number, part: Partial<Underway>) =>
    setUploads((all) => all.map((one) => (one.key === key ? { ...one, ...part } : one)));
  const drop = (key: number) => setUploads((all) => all.filter((one) => one.key !== key));

  // Who leaves the page gives up what is still being sent.
  useEffect(() => {
    const controllers = aborts.current;
    return () => {
      for (const controller of controllers.values()) controller.abort();
    };
  }, []);

  const send = async ({ key, file, machineId }: Underway): Promise<void> => {
    const abort = aborts.current.get(key);
    if (!abort || abort.signal.aborted) return;
    try {
      const arrived = await sendToolpath(machineId, {
        file,
        signal: abort.signal,
        onBytes: (sent) => change(key, { sent }),
      });
      aborts.current.delete(key);
      drop(key);
      // The toolpath's page can be drawn at once, with the reading under way.
      client.setQueryData(toolpathQuery(arrived.toolpath.id).queryKey, arrived.toolpath);
      client.invalidateQueries({ queryKey: ["toolpaths"] });
      onArrived(arrived, aborts.current.size === 0);
    } catch (error) {
      aborts.current.delete(key);
      if (abort.signal.aborted) drop(key);
      else change(key, { problem: asProblem(error) });
    }
  };

  return {
    uploads,
    add(files: readonly File[], machineId: string) {
      for (const file of files) {
        const upload = { key: nextKey.current++, file, sent: 0, machineId };
        aborts.current.set(upload.key, new AbortController());
        setUploads((all) => [...all, upload]);
        tail.current = tail.current.then(() => send(upload));
      }
    },
    cancel(key: number) {
      aborts.current.get(key)?.abort();
      drop(key);
    },
  };
}
