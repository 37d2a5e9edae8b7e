import { useCallback, useEffect, useState } from "react";
import { showToast } from "~/components/ui/toast";

export type TemplateCase = {
  readonly name: string;
  readonly modelId: string;
  readonly machineKey: string;
  readonly expected: string;
};

export type ExportTemplate = {
  readonly id: string;
  readonly name: string;
  readonly gatewayType: string;
  readonly fileName: string;
  readonly template: string;
  readonly cases: readonly TemplateCase[];
  readonly updatedBy: string;
};

export type CaseResult = {
  readonly name: string;
  readonly holds: boolean;
  readonly line: number;
  readonly message: string;
};

export type TemplateDraft = Omit<ExportTemplate, "id" | "updatedBy"> & { readonly id?: string };

type Answer<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly message: string };

export type ExportTemplateStore = {
  readonly templates: readonly ExportTemplate[] | undefined;
  readonly save: (draft: TemplateDraft) => Promise<string | undefined>;
  readonly remove: (id: string) => Promise<boolean>;
  readonly preview: (template: string, modelId: string, of: string) => Promise<Answer<{ text: string }>>;
  readonly runCases: (id: string) => Promise<readonly CaseResult[]>;
};

/** The team's export templates; they are the organisation's, so that every model shares them. */
export function useExportTemplates(): ExportTemplateStore {
  const [templates, setTemplates] = useState<readonly ExportTemplate[] | undefined>(undefined);
  const load = useCallback(async () => {
    const response = await fetch("/export-templates").catch(() => undefined);
    if (response?.ok) setTemplates((await response.json()) as readonly ExportTemplate[]);
  }, []);
  useEffect(() => void load(), [load]);

  async function change<T>(body: unknown): Promise<T | undefined> {
    const answer = await post<T>(body);
    if (answer.ok) {
      await load();
      return answer.value;
    }
    showToast({ tone: "error", title: "The template cannot be saved", detail: answer.message, seconds: 12 });
    return undefined;
  }
  return {
    templates,
    save: async (draft) => (await change<{ id: string }>({ act: "save", ...draft }))?.id,
    remove: async (id) => (await change<object>({ act: "remove", id })) !== undefined,
    preview: (template, modelId, of) => post<{ text: string }>({ act: "preview", template, modelId, of }),
    runCases: async (id) => {
      const answer = await post<{ cases: readonly CaseResult[] }>({ act: "run-cases", id });
      return answer.ok ? answer.value.cases : [];
    },
  };
}

async function post<T>(body: unknown): Promise<Answer<T>> {
  try {
    const response = await fetch("/export-templates", {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(body),
    });
    if (response.status === 204) return { ok: true, value: {} as T };
    const answer = (await response.json()) as T & {
      detail?: string;
      problems?: readonly { message: string; line?: number }[];
    };
    if (response.ok) return { ok: true, value: answer };
    const [first] = answer.problems ?? [];
    const message = first
      ? `${first.line === undefined ? "" : `Line ${first.line}: `}${first.message}`
      : (answer.detail ?? `status ${response.status}`);
    return { ok: false, message };
  } catch (error) {
    return { ok: false, message: error instanceof Error ? error.message : String(error) };
  }
}
