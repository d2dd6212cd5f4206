const deeds: Record<string, string> = {
  "account.open": "came into the network",
  "account.readmit": "let a person in again",
  "account.shut-out": "shut a person out",
  "board.add": "added a board",
  "calibration.approve": "approved a calibration",
  "calibration.store": "put in a calibration",
  "edition.publish": "published an edition",
  "edition.request": "asked for an edition",
  "invitation.send": "sent an invitation",
  "season-figure.accept": "accepted a season",
  "season-figure.fill": "put in season figures",
  "season-figure.return": "sent a season back",
  "season-figure.send": "sent a season in",
  "session.end": "ended a session",
  "session.start": "signed in",
  "terms.accept": "accepted the terms of use",
  "token.create": "made a token",
  "token.revoke": "revoked a token",
  "upload.accept": "accepted a file",
  "upload.receive": "uploaded a file",
  "workshop.create": "prepared a workshop",
};

/**
 * What was done, in words.
 *
 * @param action - as the trail stores it; one without words here is shown as it is stored, never left out
 * @example deedWords("season-figure.return") // "sent a season back"
 */
export function deedWords(action: string): string {
  return deeds[action] ?? action;
}
