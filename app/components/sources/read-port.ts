export type ReadFrame = { readonly hex: string; readonly isValid: boolean };
export type PortReading =
  | { readonly ok: true; readonly in?: ReadFrame; readonly out?: ReadFrame; readonly time: string }
  | { readonly ok: false; readonly message: string };

/** Both directions of one port as they are now; nothing is written. */
export async function readPort(sourceId: string, port: number): Promise<PortReading> {
  try {
    const response = await fetch(`/sources/${sourceId}/read`, {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify({ port }),
    });
    const answer = (await response.json()) as { in?: ReadFrame; out?: ReadFrame; time: string; detail?: string };
    return response.ok ? { ok: true, ...answer } : { ok: false, message: answer.detail ?? `status ${response.status}` };
  } catch (error) {
    return { ok: false, message: error instanceof Error ? error.message : String(error) };
  }
}
