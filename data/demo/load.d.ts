import type { Connection } from "mariadb";

export function loadDemo(options: {
  connection: Connection;
  issuer: string;
  now: Date;
}): Promise<Record<string, number>>;
