/** better-auth on our tables: e-mail and password, sign-up closed; sessions in http-only, same-site cookies. */
import { betterAuth } from "better-auth";
import { drizzleAdapter } from "better-auth/adapters/drizzle";
import { organization } from "better-auth/plugins/organization";
import { getDatabase } from "../db/client.server";
import { schema } from "../db/schema/schema";
import { getEnvironment } from "../utils/env.server";
import { singleton } from "../utils/singleton.server";
import { CLIENT_ADDRESS_HEADER } from "../utils/client-address.server";
import { getExpectedOrigins } from "./same-origin.server";

const SESSION_DAYS = 14;
const MIN_PASSWORD_LENGTH = 10;

function createAuth() {
  const environment = getEnvironment();
  return betterAuth({
    appName: "Ferrule",
    baseURL: environment.publicOrigin ?? `http://localhost:${environment.port}`,
    basePath: "/api/auth",
    secret: environment.secret,
    telemetry: { enabled: false },
    database: drizzleAdapter(getDatabase(), { provider: "sqlite", schema }),
    emailAndPassword: { enabled: true, disableSignUp: true, minPasswordLength: MIN_PASSWORD_LENGTH },
    session: { expiresIn: SESSION_DAYS * 24 * 3600, updateAge: 24 * 3600 },
    // Sign-in is limited in sign-in.server.ts by account and address; the other paths that stay open only read.
    rateLimit: { enabled: false },
    trustedOrigins: (request) => (request ? getExpectedOrigins(request) : []),
    plugins: [organization({ allowUserToCreateOrganization: false })],
    advanced: {
      ipAddress: { ipAddressHeaders: [CLIENT_ADDRESS_HEADER] },
      cookiePrefix: environment.isDemo ? "ferrule-demo" : "ferrule",
      defaultCookieAttributes: { httpOnly: true, sameSite: "lax", path: "/" },
    },
    logger: { level: "error" },
  });
}

type Auth = ReturnType<typeof createAuth>;

export function getAuth(): Auth {
  return singleton("auth", createAuth);
}
