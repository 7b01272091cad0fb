import type { ReactNode } from "react";
import { Link, NavLink, useNavigate } from "react-router-dom";
import { useRoomKeys } from "./use-room-keys.ts";
import { Wordmark } from "./wordmark.tsx";

export type Room = {
  id: string;
  label: string;
  to: string;
  /** Alt with this digit opens the room. */
  digit: number;
};

export type AppFrameProps = {
  /** Only the rooms the acting role may enter, in their fixed order. */
  rooms: readonly Room[];
  homeTo: string;
  /** A MenuSelect of the roles held, or plain text for the only one. */
  roleSwitch?: ReactNode;
  investigationSwitch?: ReactNode;
  /** Name, theme, sign-out. */
  account?: ReactNode;
  /** "cut-off 27 May 2026, 18:00 · version 1,482". */
  cutOffLine?: ReactNode;
  /** Shown on every page, such as "Invented data …". */
  banner?: ReactNode;
  /** Alt with a digit; a setting of the reader. */
  roomKeys?: boolean;
  /** The general caution. */
  footer?: ReactNode;
  children: ReactNode;
};

/** The frame of every page after sign-in: name, rooms, who one acts as, where, and as of when. */
export function AppFrame({
  rooms,
  homeTo,
  roleSwitch,
  investigationSwitch,
  account,
  cutOffLine,
  banner,
  roomKeys = true,
  footer,
  children,
}: AppFrameProps) {
  const navigate = useNavigate();
  useRoomKeys(rooms, roomKeys, navigate);
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        href="#main"
        className="sr-only z-50 bg-ink px-3 py-2 text-paper focus:not-sr-only focus:fixed focus:start-2
          focus:top-2"
      >
        Skip to the page
      </a>
      <header className="border-b border-rule">
        <div
          data-print="hide"
          className="mx-auto flex max-w-[90rem] flex-wrap items-center gap-x-7 px-4 sm:px-6
            lg:flex-nowrap"
        >
          <Link to={homeTo} className="order-1 py-2 no-underline">
            <Wordmark />
          </Link>
          <nav
            aria-label="Rooms"
            className="order-4 -mx-4 flex w-[calc(100%+2rem)] gap-3.5 overflow-x-auto px-4 sm:-mx-6
              sm:w-[calc(100%+3rem)] sm:gap-5 sm:px-6 lg:order-2 lg:mx-0 lg:w-auto lg:overflow-visible
              lg:px-0"
          >
            {rooms.map((room) => (
              <NavLink
                key={room.id}
                to={room.to}
                aria-keyshortcuts={roomKeys ? `Alt+${room.digit}` : undefined}
                title={roomKeys ? `Alt+${room.digit}` : undefined}
                className="-mb-px flex min-h-11 shrink-0 items-center border-b-[3px]
                  border-transparent px-0.5 pt-[3px] text-ink-2 no-underline hover:text-ink
                  focus-visible:-outline-offset-2 aria-[current=page]:border-kelp
                  aria-[current=page]:text-ink lg:min-h-13"
              >
                {room.label}
              </NavLink>
            ))}
          </nav>
          {investigationSwitch || roleSwitch ? (
            <div
              className="order-3 flex w-full min-w-0 items-center gap-3 py-1 text-sm sm:ms-auto
                sm:w-auto *:min-w-0"
            >
              {investigationSwitch}
              {roleSwitch}
            </div>
          ) : null}
          <div
            className={`order-2 ms-auto flex items-center gap-3 text-sm sm:order-3 ${
              investigationSwitch || roleSwitch ? "sm:ms-0" : ""
            }`}
          >
            {account}
          </div>
        </div>
        {banner || cutOffLine ? (
          <div className="border-t border-rule bg-paper-2">
            <div
              className="mx-auto flex max-w-[90rem] flex-wrap justify-between gap-x-6 px-4 py-1
                text-sm sm:px-6"
            >
              <div className="text-ochre">{banner}</div>
              <div className="text-ink-2">{cutOffLine}</div>
            </div>
          </div>
        ) : null}
      </header>
      <main id="main" tabIndex={-1} className="mx-auto w-full max-w-[90rem] flex-1 px-4 sm:px-6">
        {children}
      </main>
      {footer ? (
        <footer className="mt-10 border-t border-rule">
          <div className="mx-auto max-w-[90rem] px-4 py-4 text-sm text-ink-2 sm:px-6">{footer}</div>
        </footer>
      ) : null}
    </div>
  );
}
