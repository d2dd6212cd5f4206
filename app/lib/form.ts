import { badRequest } from "./errors.ts";

/**
 * The fields of the form that a request carries.
 *
 * @returns no field at all when nothing was sent
 * @throws 400 when what was sent is cut short or no form
 */
export async function readForm(request: Request): Promise<FormData> {
  if (!request.headers.has("content-type")) return new FormData();
  try {
    return await request.formData();
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    throw badRequest("The form did not arrive whole. Go back, and send it once more.");
  }
}
