import { Download, Trash2 } from "lucide-react";
import { useState } from "react";
import { Form, href, Link } from "react-router";
import { FrameReader } from "~/components/frames/frame-reader";
import { pickText } from "~/components/frames/field-name";
import { ProblemList } from "~/components/models/problem-list";
import { Button, buttonClass, TextLink } from "~/components/ui/button";
import { cx } from "~/components/ui/cx";
import { Dialog, DialogClose } from "~/components/ui/dialog";
import { Select } from "~/components/ui/field";
import { Icon } from "~/components/ui/icon";
import { Notice } from "~/components/ui/notice";
import { Block, Page } from "~/components/ui/page";
import type { DeviceSummary } from "~/services/read-devices.server";
import { DeviceCodes } from "./device-codes";
import { DeviceIdentity } from "./device-identity";
import type { DevicePage } from "./device-page";
import { DeviceParameters } from "./device-parameters";
import { DeviceVersions } from "./device-versions";

type Props = { device: DevicePage; editBlockedBy: string | undefined; refusal: string | undefined };

/** All that one description says. */
export function DeviceView({ device, editBlockedBy, refusal }: Props) {
  const { summary, description, problems, versions } = device;
  const [language, setLanguage] = useState(description.languages[0] ?? "en");
  const product = summary.productIds[0] ?? summary.deviceName;
  return (
    <Page
      title={product}
      about={`${pickText(description.deviceName, language) ?? summary.deviceName}, ${summary.vendorName}`}
      actions={
        <>
          {description.languages.length > 1 ? (
            <Select
              aria-label="Language"
              size="medium"
              className="w-24!"
              value={language}
              onChange={(event) => setLanguage(event.currentTarget.value)}
            >
              {description.languages.map((tag) => (
                <option key={tag} value={tag}>
                  {tag}
                </option>
              ))}
            </Select>
          ) : null}
          <a href={`/devices/${summary.id}/file`} download={summary.fileName} className={buttonClass()}>
            <Icon of={Download} /> Download the original
          </a>
          <RemoveDevice summary={summary} product={product} blockedBy={editBlockedBy} />
        </>
      }
    >
      {refusal ? <Notice tone="error" live title={refusal} className="mb-3" /> : null}
      {versions.length > 1 ? <VersionLinks versions={versions} here={summary.id} /> : null}
      <div className="grid gap-8">
        <Block title="Process data">
          <FrameReader
            device={product}
            processData={description.processData}
            profileCharacteristic={description.profileCharacteristic}
            language={language}
          />
        </Block>
        <DeviceIdentity device={device} language={language} />
        <DeviceParameters description={description} language={language} />
        <DeviceCodes description={description} language={language} />
        {versions.length > 1 ? <DeviceVersions device={device} language={language} /> : null}
        <Block title="Feeds" about="Mappings that read this device.">
          {summary.usedBy.length === 0 ? (
            <p className="text-small text-ink-2">
              No mapping reads it yet. Give a role of a machine type this device on the Mapping page of a model.
            </p>
          ) : (
            <ul className="text-small">
              {summary.usedBy.map((use) => (
                <li key={`${use.modelId} ${use.type} ${use.role}`} className="py-0.5">
                  <TextLink to={href("/models/:modelId/mapping", { modelId: use.modelId })}>
                    <em>{use.type}</em> of {use.model}
                  </TextLink>{" "}
                  as {use.role}
                </li>
              ))}
            </ul>
          )}
        </Block>
        {problems.length > 0 ? (
          <Block title="Problems of the file">
            <ProblemList problems={problems} caption="Problems of the file" />
          </Block>
        ) : null}
      </div>
    </Page>
  );
}

function VersionLinks({ versions, here }: { versions: readonly DeviceSummary[]; here: string }) {
  return (
    <nav aria-label="Versions" className="mb-4 flex flex-wrap gap-1.5 text-small">
      {versions.map((version) => (
        <Link
          key={version.id}
          to={href("/devices/:deviceId", { deviceId: version.id })}
          aria-current={version.id === here ? "page" : undefined}
          className={cx(
            "rounded-edge border px-2 py-0.5 font-mono",
            version.id === here ? "border-ink bg-ink text-ink-on" : "border-edge bg-leaf hover:bg-bench-2",
          )}
        >
          {version.documentVersion} · {version.releaseDate} · IODD {version.schemaVersion}
        </Link>
      ))}
    </nav>
  );
}

function RemoveDevice({
  summary,
  product,
  blockedBy,
}: {
  summary: DeviceSummary;
  product: string;
  blockedBy: string | undefined;
}) {
  const reason =
    blockedBy ?? (summary.usedBy.length > 0 ? "a mapping reads it; give that role another device first" : undefined);
  if (reason !== undefined)
    return (
      <Button icon={Trash2} blockedBy={reason}>
        Remove
      </Button>
    );
  return (
    <Dialog
      title={`Remove ${product} ${summary.documentVersion}?`}
      about="The description leaves the library. The file as it was uploaded can be added again."
      trigger={<Button icon={Trash2}>Remove</Button>}
    >
      <Form method="post" className="flex justify-end gap-2">
        <DialogClose asChild>
          <Button>Keep it</Button>
        </DialogClose>
        <Button type="submit" tone="danger" name="intent" value="remove">
          Remove
        </Button>
      </Form>
    </Dialog>
  );
}
