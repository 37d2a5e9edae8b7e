export type ReadFrame = { readonly hex: string; readonly isValid: boolean };
export type PortReading =
  | { readonly ok: true; readonly in?: ReadFrame; readonly out?: ReadFrame; readonly time: string }
  | { readonly ok: false; readonly message: string };

/** Both directions of one port as they are now; nothing is written. */
export async function readPort(sourceId: string, port: number): Promise<PortReading> {
  const answer = await ask<{ in?: ReadFrame; out?: ReadFrame; time: string }>(sourceId, { port });
  return answer.ok ? { ...answer.value, ok: true } : answer;
}

export type RegisterQuestion = {
  readonly unitId: number;
  readonly table: string;
  readonly address: number;
  readonly count: number;
};

/** Registers, or bits as 0 and 1, as they are now; nothing is written. */
export async function readRegisters(
  sourceId: string,
  question: RegisterQuestion,
): Promise<
  { readonly ok: true; readonly words: readonly number[] } | { readonly ok: false; readonly message: string }
> {
  const answer = await ask<{ words?: readonly number[] }>(sourceId, question);
  return answer.ok ? { ok: true, words: answer.value.words ?? [] } : answer;
}

async function ask<T>(
  sourceId: string,
  body: unknown,
): Promise<{ readonly ok: true; readonly value: T } | { readonly ok: false; readonly message: string }> {
  try {
    const response = await fetch(`/sources/${sourceId}/read`, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify(body),
    });
    const answer = (await response.json()) as T & { detail?: string };
    if (response.ok) return { ok: true, value: answer };
    return { ok: false, message: answer.detail ?? `status ${response.status}` };
  } catch (error) {
    return { ok: false, message: error instanceof Error ? error.message : String(error) };
  }
}
