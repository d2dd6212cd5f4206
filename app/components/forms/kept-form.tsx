import { type ComponentProps, type SubmitEvent, useEffect, useRef, useState } from "react";
import { Form, useLocation } from "react-router";
import { Notice } from "#app/components/ui/notice.tsx";

const armedKey = "kept-form:armed";

/** Called by the sign-in page when a form met an ended session: its values are then put back after signing in. */
export function armKeptForms() {
  sessionStorage.setItem(armedKey, "1");
}

type Props = ComponentProps<typeof Form> & {
  /** Names the form on its page. */
  formKey: string;
  /** Whose values they are: another person signing in on the same browser gets none of them. */
  ownerId: number;
};

function keptValues(form: HTMLFormElement) {
  const values = [...new FormData(form)].flatMap(([name, value]) => (typeof value === "string" ? [[name, value]] : []));
  return JSON.stringify(values);
}

function putBack(form: HTMLFormElement, text: string) {
  const parsed: unknown = JSON.parse(text);
  if (!Array.isArray(parsed)) return;
  for (const entry of parsed) {
    if (!Array.isArray(entry)) continue;
    const [name, value] = entry as unknown[];
    if (typeof name !== "string" || typeof value !== "string") continue;
    const control = form.elements.namedItem(name);
    const isText = control instanceof HTMLInputElement && !["hidden", "file", "checkbox"].includes(control.type);
    if (isText || control instanceof HTMLTextAreaElement || control instanceof HTMLSelectElement) control.value = value;
  }
}

/**
 * A form whose typed values outlive a session that ends while it is filled in. They stay in this tab alone, and only
 * until the form is sent or the page is opened anew without having been interrupted.
 */
export function KeptForm({ formKey, ownerId, onSubmit, children, ...rest }: Props) {
  const form = useRef<HTMLFormElement>(null);
  const { pathname } = useLocation();
  const key = `kept-form:${ownerId}:${pathname}:${formKey}`;
  const [isPutBack, setPutBack] = useState(false);

  useEffect(() => {
    const text = sessionStorage.getItem(key);
    if (text === null || !form.current) return;
    sessionStorage.removeItem(key);
    if (sessionStorage.getItem(armedKey) === null) return;
    sessionStorage.removeItem(armedKey);
    putBack(form.current, text);
    // Shown once, after the first paint: the server cannot know what the tab kept.
    setPutBack(true);
  }, [key]);

  function keep(event: SubmitEvent<HTMLFormElement>) {
    onSubmit?.(event);
    if (!event.defaultPrevented) sessionStorage.setItem(key, keptValues(event.currentTarget));
  }

  return (
    <>
      {isPutBack && (
        <Notice title="You had been signed out, so nothing was sent.">
          What you typed is back in the form. Look it over and send it again; a file has to be chosen again.
        </Notice>
      )}
      <Form {...rest} ref={form} onSubmit={keep}>
        {children}
      </Form>
    </>
  );
}
