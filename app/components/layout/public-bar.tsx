import { Link } from "react-router";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { brandClass, DoubleRule } from "./double-rule.tsx";
import { Mark } from "./mark.tsx";
import { SkipLink } from "./skip-link.tsx";

/** The bar of pages that need no sign-in. The sign-in page itself leaves the button out. */
export function PublicBar({ hasSignIn = true }: { hasSignIn?: boolean }) {
  return (
    <>
      <SkipLink />
      <header>
        <DoubleRule>
          <Link to="/" className={brandClass}>
            <Mark />
          </Link>
          <div className="ml-auto flex items-center gap-4.5">
            <span className="hidden sm:inline">
              <TextLink to="/protection">How towns are protected</TextLink>
            </span>
            {hasSignIn && (
              <ButtonLink to="/login" size="slim">
                Sign in
              </ButtonLink>
            )}
          </div>
        </DoubleRule>
      </header>
    </>
  );
}
