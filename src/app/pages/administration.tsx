import { NavLink, Outlet } from "react-router-dom";
import { useMe } from "../../features/accounts/api/get-me.ts";
import { usePageTitle } from "../../lib/page-title.ts";
import { pages } from "../../lib/paths.ts";
import { OwnBar } from "../own-bar.tsx";

const PARTS = [
  { to: pages.administration, words: "Messages" },
  { to: `${pages.administration}/accounts`, words: "Accounts" },
  { to: `${pages.administration}/journal`, words: "Journal" },
] as const;

/** For whoever administers the installation; it opens no study. */
export default function AdministrationPage() {
  const { data: me } = useMe();
  usePageTitle("Administration");
  return (
    <>
      <OwnBar />
      <main className="studies">
        <div className="studies-left">
          <h1 className="type-display own-title">Administration</h1>
          <p className="type-finding pt-2 pb-5 lg:pb-9">
            What the installation sends, who has an account, what concerns it. Studies are their people's own.
          </p>
          {me?.isAdministrator && (
            <nav aria-label="Parts of the administration">
              <ul className="finder-filters border-rule2 border-b">
                {PARTS.map(({ to, words }) => (
                  <li key={to} className="border-rule2 border-t">
                    <NavLink
                      end
                      to={to}
                      className={({ isActive }) =>
                        `flex min-h-8.5 items-center text-ink no-underline hover:text-accent ${isActive ? "font-semibold" : ""}`
                      }
                    >
                      {words}
                    </NavLink>
                  </li>
                ))}
              </ul>
            </nav>
          )}
        </div>
        <div className="studies-right">
          {me?.isAdministrator ? (
            <Outlet />
          ) : (
            <p className="type-finding">This is for administrators of the installation, and you are not one of them.</p>
          )}
        </div>
      </main>
    </>
  );
}
