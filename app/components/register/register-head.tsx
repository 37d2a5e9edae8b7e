import type { Column } from "./columns";

export function RegisterHead({ columns, template, width }: { columns: readonly Column[]; template: string; width: number }) {
  return (
    <div className="register-head" role="row" aria-rowindex={1} style={{ gridTemplateColumns: template, minWidth: width }}>
      {columns.map((column, index) => (
        <div key={column.id} role="columnheader" aria-colindex={index + 1} className={column.isRight ? "justify-end" : ""}>
          {column.title}
        </div>
      ))}
    </div>
  );
}
