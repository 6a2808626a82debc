import { useEffect, useRef, useState, type RefObject } from 'react';
import { Outlet, ScrollRestoration, useLocation, useNavigation } from 'react-router-dom';
import { useSession } from '../api/session';
import { useGroup } from '../api/use-group';
import { AccountMenu } from './account-menu';
import { Button } from './button';
import { Dialog } from './dialog';
import { FindField } from './find-field';
import { GroupSwitch } from './group-switch';
import { useKeys } from './keys';
import { KeysDialog } from './keys-dialog';
import { Popover } from './popover';
import { Rail } from './rail';
import { ThemeSwitch } from './theme-switch';

/** The frame around every page of a group: rail, top bar, content. */
export function Shell() {
  const group = useGroup();
  const [keysOpen, setKeysOpen] = useState(false);
  const main = useRef<HTMLElement>(null);
  useKeys([{ key: '?', label: 'This list', action: () => setKeysOpen(true) }]);
  useFocusOnNewPage(main);
  return (
    <div className="min-h-dvh wide:grid wide:grid-cols-[11rem_minmax(0,1fr)]">
      <a
        href="#main"
        className="sr-only focus:not-sr-only focus:fixed focus:top-2 focus:left-2 focus:z-50 focus:bg-raised focus:p-3"
      >
        Skip to the content
      </a>
      <div className="screen-only hidden border-r border-rule wide:block">
        <div className="sticky top-0 py-4">
          <Rail group={group.slug} withName />
        </div>
      </div>
      <div className="min-w-0">
        <TopBar onKeys={() => setKeysOpen(true)} />
        <main
          ref={main}
          id="main"
          tabIndex={-1}
          className="mx-auto max-w-[100rem] px-4 py-5 outline-none sm:px-6"
        >
          <Outlet />
        </main>
      </div>
      <KeysDialog open={keysOpen} onClose={() => setKeysOpen(false)} />
      <ScrollRestoration />
    </div>
  );
}

function TopBar({ onKeys }: { onKeys: () => void }) {
  const group = useGroup();
  const { person } = useSession();
  const busy = useNavigation().state !== 'idle';
  return (
    <header className="screen-only sticky top-0 z-30 border-b border-rule bg-page">
      <div className="mx-auto flex max-w-[100rem] items-center gap-2 px-4 py-2.5 sm:px-6">
        <NarrowMenu onKeys={onKeys} />
        <FindField group={group.slug} />
        <div className="hidden items-center gap-2 wide:flex">
          <Popover label={group.name} ariaLabel={`Group: ${group.name}`} align="end">
            {(close) => <GroupSwitch current={group.slug} onChoose={close} />}
          </Popover>
          <Popover label="Theme" align="end">
            {() => <ThemeSwitch />}
          </Popover>
          <Popover label={person?.name ?? 'Account'} ariaLabel={`Account: ${person?.name ?? ''}`} align="end">
            {(close) => (
              <AccountMenu
                onKeys={() => {
                  close();
                  onKeys();
                }}
              />
            )}
          </Popover>
        </div>
      </div>
      <div role="status" className="absolute inset-x-0 bottom-0 h-0.5 overflow-hidden">
        {busy && (
          <>
            <span className="sr-only">Opening…</span>
            <div className="working-line h-full w-1/4 bg-accent" />
          </>
        )}
      </div>
    </header>
  );
}

/** On narrow screens rail and menus stand together behind one button. */
function NarrowMenu({ onKeys }: { onKeys: () => void }) {
  const group = useGroup();
  const [open, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <div className="wide:hidden">
      <Button aria-expanded={open} aria-label={`Menu of ${group.name}`} onClick={() => setOpen(true)}>
        Menu
      </Button>
      <Dialog open={open} onClose={close} title={group.name}>
        <Rail group={group.slug} onChoose={close} />
        <hr className="border-rule" />
        <GroupSwitch current={group.slug} onChoose={close} />
        <hr className="border-rule" />
        <ThemeSwitch />
        <hr className="border-rule" />
        <AccountMenu
          onKeys={() => {
            close();
            onKeys();
          }}
        />
      </Dialog>
    </div>
  );
}

/**
 * After a change of page, focus goes to the content, as it does when a browser loads a page; it stays where it is
 * while only the query changes, and when the new page has already taken it.
 */
function useFocusOnNewPage(main: RefObject<HTMLElement | null>): void {
  const { pathname } = useLocation();
  const seen = useRef(pathname);
  useEffect(() => {
    if (seen.current === pathname) return;
    seen.current = pathname;
    if (main.current?.contains(document.activeElement) !== true) main.current?.focus({ preventScroll: true });
  }, [pathname, main]);
}
