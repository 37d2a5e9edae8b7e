/** The frame of a role's process data as the ruler and the bench show it. */
import { viewFrame, type FrameView } from "../frames/frame-fields";
import type { ProcessDataImage } from "~/domain/iodd/device-description";
import type { Role } from "~/domain/mapping/mapping-parts";

const views = new WeakMap<ProcessDataImage, FrameView>();

/** The frame of a role's process data, made once a layout. */
export function viewRoleFrame(role: Role, direction: "in" | "out"): FrameView | undefined {
  const image = role.layouts?.[direction] as ProcessDataImage | undefined;
  if (!image) return undefined;
  const known = views.get(image);
  if (known) return known;
  const view = viewFrame(image, { profileCharacteristic: role.profileCharacteristic ?? [] });
  views.set(image, view);
  return view;
}
