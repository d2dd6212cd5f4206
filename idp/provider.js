import { interactionPolicy, Provider } from "oidc-provider";
import { spoil } from "./faults.js";
import { errorPage, pagePolicy, signedOutPage, signOutPage } from "./pages.js";

const scopes = ["openid", "profile", "email"];

/**
 * The OpenID provider with one client, the application.
 *
 * @param {object} given
 * @param {string} given.issuer
 * @param {string} given.applicationOrigin
 * @param {string} given.clientId
 * @param {string} given.clientSecret
 * @param {{ jwk: import("jose").JWK, cookieKey: string }} given.keys
 * @param {ReturnType<typeof import("./people.js").peopleOf>} given.people
 * @param {() => string | null} given.fault the fault in force
 * @returns {Provider}
 */
export function createProvider({ issuer, applicationOrigin, clientId, clientSecret, keys, people, fault }) {
  const show = (ctx, html) => {
    ctx.type = "html";
    ctx.set("Content-Security-Policy", pagePolicy(applicationOrigin));
    ctx.body = html;
  };
  const provider = new Provider(issuer, {
    clients: [
      {
        client_id: clientId,
        client_secret: clientSecret,
        redirect_uris: [`${applicationOrigin}/auth/callback`],
        post_logout_redirect_uris: [`${applicationOrigin}/`],
        response_types: ["code"],
        grant_types: ["authorization_code"],
        token_endpoint_auth_method: "client_secret_basic",
        require_auth_time: true,
      },
    ],
    jwks: { keys: [keys.jwk] },
    cookies: { keys: [keys.cookieKey], long: { sameSite: "lax" }, short: { sameSite: "lax" } },
    scopes,
    claims: { openid: ["sub"], profile: ["name"], email: ["email", "email_verified"] },
    // The name and the address are wanted in the ID token too, not at the userinfo endpoint alone.
    conformIdTokenClaims: false,
    pkce: { required: () => true },
    features: {
      devInteractions: { enabled: false },
      // The built-in pages load a font from another host.
      rpInitiatedLogout: {
        enabled: true,
        logoutSource: (ctx, form) => show(ctx, signOutPage(form)),
        postLogoutSuccessSource: (ctx) => show(ctx, signedOutPage(applicationOrigin)),
      },
    },
    renderError: (ctx, { error }) => show(ctx, errorPage(applicationOrigin, error)),
    findAccount: (_ctx, sub) => {
      const person = people.find(sub);
      if (!person) return undefined;
      const { name, email } = person;
      return { accountId: sub, claims: () => ({ sub, name, email, email_verified: true }) };
    },
    interactions: { policy: policyWithHint(people), url: (_ctx, { uid }) => `/interaction/${uid}` },
    ttl: {
      AccessToken: 3_600,
      AuthorizationCode: 60,
      IdToken: 3_600,
      Interaction: 3_600,
      Session: 86_400,
      Grant: 86_400,
    },
    loadExistingGrant,
  });
  provider.use(async (ctx, next) => {
    await next();
    const name = fault();
    if (name !== null && ctx.path === "/token" && typeof ctx.body?.id_token === "string") {
      ctx.body.id_token = await spoil(ctx.body.id_token, name, keys.jwk);
    }
  });
  return provider;
}

/** Somebody signed in here as one person, and now asked for as another, is asked again. */
function policyWithHint(people) {
  const policy = interactionPolicy.base();
  const isOtherThanHinted = ({ oidc }) =>
    people.find(oidc.params.login_hint) !== undefined && oidc.session.accountId !== oidc.params.login_hint;
  policy
    .get("login")
    .checks.add(new interactionPolicy.Check("other_person", "Another person is asked for", isOtherThanHinted));
  return policy;
}

/** No page asks for consent: the one client is the network's own application. */
async function loadExistingGrant({ oidc }) {
  const grantId = oidc.result?.consent?.grantId ?? oidc.session.grantIdFor(oidc.client.clientId);
  if (grantId) return oidc.provider.Grant.find(grantId);
  const grant = new oidc.provider.Grant({ clientId: oidc.client.clientId, accountId: oidc.session.accountId });
  grant.addOIDCScope(scopes.join(" "));
  await grant.save();
  return grant;
}
