import { X } from "lucide-react";
import { lazy, Suspense, useEffect, useRef, useState } from "react";
import { NodeClassGlyph } from "../notation/node-class-glyph";
import { IconButton } from "../ui/button";
import { AddMemberForm } from "./add-member-form";
import { AddMethodForm } from "./add-method-form";
import type { AddFormProps, AddRequest } from "./add-request";
import { AddTypeForm } from "./add-type-form";
import "./model.css";

/** Its commands are many and rarely wanted, so they come on demand. */
const AddDataTypeForm = lazy(() => import("../types/add-data-type-form").then((module) => ({ default: module.AddDataTypeForm })));

type Props = { request: AddRequest; onClose: () => void };

const TITLES: Readonly<Record<AddRequest["kind"], string>> = {
  Object: "New Object",
  Variable: "New Variable",
  Property: "New Property",
  Method: "New Method",
  View: "New View",
  ObjectType: "New ObjectType",
  VariableType: "New VariableType",
  DataType: "New DataType",
  ReferenceType: "New ReferenceType",
};

/** Stands beside the drawing or the table while nodes are added; Enter adds and asks for the next one. */
export function AddNodePanel({ request, onClose }: Props) {
  const panel = useRef<HTMLElement>(null);
  const [said, setSaid] = useState("");

  useEffect(() => {
    panel.current?.querySelector<HTMLElement>("input[data-first]")?.focus();
    return () => document.querySelector<HTMLElement>("[data-keyboard]")?.focus({ preventScroll: true });
  }, []);

  /** Says what was added and leaves the caret in the first field for the next one. */
  function done(name: string, closes: boolean): void {
    setSaid(`${name} added`);
    if (closes) onClose();
    else panel.current?.querySelector<HTMLElement>("input[data-first]")?.focus();
  }

  return (
    <aside
      ref={panel}
      className="add-panel"
      aria-label={TITLES[request.kind]}
      onKeyDown={(event) => {
        event.stopPropagation();
        if (event.key === "Escape" && !event.defaultPrevented) onClose();
      }}
    >
      <header>
        <NodeClassGlyph kind={request.kind} />
        <h2 className={request.kind.endsWith("Type") ? "italic" : ""}>{TITLES[request.kind]}</h2>
        <span role="status" className="ml-auto truncate text-note text-good">
          {said}
        </span>
        <IconButton icon={X} label="Close" keys="Esc" size="small" onClick={onClose} />
      </header>
      <FormOf request={request} onDone={done} />
    </aside>
  );
}

function FormOf(props: AddFormProps) {
  switch (props.request.kind) {
    case "ObjectType":
    case "VariableType":
    case "ReferenceType":
      return <AddTypeForm {...props} kind={props.request.kind} />;
    case "DataType":
      return (
        <Suspense>
          <AddDataTypeForm onDone={props.onDone} />
        </Suspense>
      );
    case "Method":
      return <AddMethodForm {...props} />;
    default:
      return <AddMemberForm {...props} />;
  }
}
