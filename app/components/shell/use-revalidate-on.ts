import { useEffect, useRef } from "react";
import { useRevalidator } from "react-router";
import { subscribeToTopic } from "./event-stream";

const settleMs = 300;

/** Reads the page's data anew, a moment after something was told on one of the topics. */
export function useRevalidateOn(...topics: readonly string[]): void {
  const { revalidate } = useRevalidator();
  const latest = useRef(revalidate);
  latest.current = revalidate;
  const joined = topics.join("\n");
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    const told = () => {
      clearTimeout(timer);
      timer = setTimeout(() => void latest.current(), settleMs);
    };
    const ends = joined.split("\n").map((topic) => subscribeToTopic(topic, told));
    return () => {
      clearTimeout(timer);
      for (const end of ends) end();
    };
  }, [joined]);
}
