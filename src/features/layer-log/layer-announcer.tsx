import { useEffect, useState } from "react";

/** Reads the pinned layer out once the keys have come to rest, so that walking through layers does not chatter. */
export function LayerAnnouncer({ text }: { text: string }) {
  const [said, setSaid] = useState("");
  useEffect(() => {
    const timer = setTimeout(() => setSaid(text), 250);
    return () => clearTimeout(timer);
  }, [text]);
  return (
    <p role="status" className="sr-only">
      {said}
    </p>
  );
}
