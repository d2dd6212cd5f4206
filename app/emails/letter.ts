/** What every mail of the network is made of: plain paragraphs, one address to go to. */
export type Letter = { toName: string; toAddress: string; subject: string; text: string; html: string };

type LetterParts = {
  toName: string;
  toAddress: string;
  subject: string;
  paragraphs: readonly string[];
  link: { label: string; address: string };
};

function escapeHtml(text: string) {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;").replaceAll('"', "&quot;");
}

/** One letter as text and as HTML, saying the same. */
export function letter({ toName, toAddress, subject, paragraphs, link }: LetterParts): Letter {
  const greeting = `Hello ${toName},`;
  const text = [greeting, ...paragraphs, `${link.label}: ${link.address}`, "Commonweigh"].join("\n\n");
  const html = [
    '<!doctype html><html lang="en"><body style="font-family:sans-serif;line-height:1.5;color:#1d2a31">',
    ...[greeting, ...paragraphs].map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
    `<p><a href="${escapeHtml(link.address)}" style="color:#0d5b4c">${escapeHtml(link.label)}</a></p>`,
    "<p>Commonweigh</p></body></html>",
  ].join("\n");
  return { toName, toAddress, subject, text, html };
}
