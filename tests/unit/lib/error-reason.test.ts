import { DatabaseError } from "sequelize";
import { expect, test } from "vitest";
import { databaseCode, placesOf, reasonOf } from "#app/lib/error-reason.ts";

/** As the driver makes them: the statement and its values stand in the message. */
function refusedInsert() {
  const sql = "INSERT INTO user_account (email) VALUES (?) - parameters:['ada@town.example']";
  const parent = Object.assign(new Error(`(no: 1062) Duplicate entry 'ada@town.example'\nsql: ${sql}`), {
    code: "ER_DUP_ENTRY",
    sql,
  });
  return new DatabaseError(parent);
}

test("of a database error only the code is told, never the statement or a value", () => {
  const error = refusedInsert();
  expect(error.message).toContain("ada@town.example");
  expect(databaseCode(error)).toBe("ER_DUP_ENTRY");
  expect(reasonOf(error)).toBe("The database refused: ER_DUP_ENTRY");
});

test("the places tell where it was thrown, without the message", () => {
  const places = placesOf(refusedInsert());
  expect(places[0]).toMatch(/^at .*error-reason\.test\.ts/);
  expect(places.join()).not.toContain("ada@town.example");
});

test.each([
  [new Error("x".repeat(500)), "x".repeat(300)],
  ["thrown text", "unknown"],
  [null, "unknown"],
])("other errors are told by their message, at most 300 characters: %#", (error, reason) => {
  expect(databaseCode(error)).toBeNull();
  expect(reasonOf(error)).toBe(reason);
});

test("what is no error has no places", () => {
  expect(placesOf("thrown text")).toEqual([]);
});
