/** The reference of the sheet's frame times: xyflow as it comes, with as many default nodes at the places of the cards. */
import { ReactFlow, type Node } from "@xyflow/react";
import "@xyflow/react/dist/style.css";
import { createRoot } from "react-dom/client";

const parameters = new URLSearchParams(window.location.search);
const read = (name: string): number => Number(parameters.get(name));

const columns = read("columns");
const nodes: Node[] = Array.from({ length: read("count") }, (_, index) => ({
  id: String(index),
  position: { x: (index % columns) * read("stepX"), y: Math.floor(index / columns) * read("stepY") },
  data: { label: `Node ${index}` },
}));

const defaultViewport = { x: read("x"), y: read("y"), zoom: read("zoom") };
const root = document.getElementById("root");
if (root) {
  createRoot(root).render(
    <ReactFlow defaultNodes={nodes} defaultEdges={[]} minZoom={0.02} defaultViewport={defaultViewport} />,
  );
}
