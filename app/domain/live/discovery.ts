/** What a server says of itself before anybody signs in (GetEndpoints, OPC 10000-4 §5.5.4). */
export type OfferedCertificate = {
  /** DER, base64. */
  readonly data: string;
  /** SHA-256 of the DER, hexadecimal pairs. */
  readonly fingerprint: string;
  readonly subject: string;
  readonly issuer: string;
  readonly isSelfSigned: boolean;
  /** ISO 8601, UTC. */
  readonly validFrom: string;
  readonly validTo: string;
};

export type OfferedEndpoint = {
  readonly url: string;
  readonly securityMode: "none" | "sign" | "sign-and-encrypt";
  readonly securityPolicy: string;
  /** Whether Ferrule speaks the policy. */
  readonly isKnown: boolean;
  readonly tokens: readonly ("anonymous" | "user-name" | "certificate")[];
  readonly securityLevel: number;
};

export type Discovery = {
  readonly applicationName: string;
  readonly applicationUri: string;
  readonly productUri: string;
  readonly endpoints: readonly OfferedEndpoint[];
  readonly certificate: OfferedCertificate | null;
};
