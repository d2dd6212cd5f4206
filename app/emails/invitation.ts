import type { Role } from "#app/context.ts";
import { type Letter, letter } from "./letter.ts";

type Occasion = {
  toName: string;
  toAddress: string;
  role: Role;
  townName: string | null;
  fromName: string;
  address: string;
};

/** Sent when the coordinator invites a person. */
export function invitationLetter({ role, townName, fromName, address, ...to }: Occasion): Letter {
  const as = townName === null ? `${role === "analyst" ? "an" : "a"} ${role}` : `${role} of ${townName}`;
  return letter({
    ...to,
    subject: `You are invited to Commonweigh as ${as}`,
    paragraphs: [
      `${fromName} invites you to Commonweigh as ${as}.`,
      "The invitation is good for seven days, and for one person. Nothing happens until you open it and sign in.",
    ],
    link: { label: "Open the invitation", address },
  });
}
