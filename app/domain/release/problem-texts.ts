export const releaseProblemTexts: Readonly<Record<string, string>> = {
  "release.version": "“{version}” is no version of three numbers, such as 1.2.0.",
  "release.version-not-higher": "{version} is not higher than {last}, the version released last.",
  "release.version-too-low": "The changes are {rating}; after {last} they ask for {proposed} at least, not {version}.",
  "release.date-not-later": "The publication date must be later than that of the release before ({last}).",
  "release.breaking-same-namespace":
    "Breaking changes go out under the same namespace; readers of older versions must change before (OPC 11030 §3.3).",
  "release.requirement-open":
    "The required model {modelUri} has neither a version nor a publication date that could be pinned.",
  "release.requirement-unreleased":
    "The required model {name} is one of your own and has no release that fits revision {revision}; release it first.",
  "bundle.unreadable": "The file is no ZIP archive that can be read: {message}.",
  "bundle.too-large": "The archive is larger than {limit} bytes, or unpacks to more.",
  "bundle.no-manifest": "The archive holds no {file}; it is no bundle of a release.",
  "bundle.manifest": "The manifest does not follow its form: {message}.",
  "bundle.file-missing": "{path} is named by the manifest and not there.",
  "bundle.file-unknown": "{path} is there and not named by the manifest.",
  "bundle.file-changed": "{path} is not what was released: its SHA-256 differs.",
  "bundle.no-signature": "The archive holds no {file}; nobody has signed it.",
  "bundle.signature": "The signature does not fit the manifest.",
  "bundle.key-unreadable": "{file} holds no public key in PEM form.",
  "bundle.key": "The bundle is signed with another key ({found}) than the one given ({given}).",
};
