import { render } from 'preact';
import './style/paper.css';
import './style/rounds.css';
import './style/ram.css';
import './style/load.css';
import './style/print.css';
import { LoadPage } from './load/load-page';
import { ReceiptPage } from './load/receipt-page';
import { RamPage } from './ram/ram-page';
import { VisitPage } from './ram/visit-page';
import { RoundsPage } from './rounds/rounds-page';
import { place } from './router';
import { NewRamPage } from './set-up/new-ram-page';
import { Sheet } from './sheet';

function Page() {
  const at = place.value;
  switch (at.page) {
    case 'rounds':
      return <RoundsPage />;
    case 'ram':
      return <RamPage key={at.key} ram={at.key} />;
    case 'visit':
      return <VisitPage key={at.key} ram={at.key} />;
    case 'load':
      return <LoadPage ram={at.key} />;
    case 'receipt':
      return <ReceiptPage key={at.load} load={at.load} />;
    case 'new':
      return <NewRamPage />;
    default:
      return (
        <Sheet title="Nothing here">
          <p>
            This address leads nowhere. <a href="#/">Back to the rounds</a>.
          </p>
        </Sheet>
      );
  }
}

function Frame() {
  const at = place.value.page;
  return (
    <>
      <button type="button" class="skip" onClick={() => document.getElementById('main')?.focus()}>
        Skip to the page
      </button>
      <header class="masthead">
        <a class="name" href="#/">
          Clackwatch
        </a>
        <nav aria-label="Rooms">
          <a href="#/" aria-current={at === 'rounds' ? 'page' : undefined}>
            Rounds
          </a>
          <a href="#/load" aria-current={at === 'load' ? 'page' : undefined}>
            Load
          </a>
          <a href="#/new" aria-current={at === 'new' ? 'page' : undefined}>
            Add a ram
          </a>
        </nav>
      </header>
      <main id="main" tabIndex={-1}>
        <Page />
      </main>
      <footer class="foot">
        <p>
          Hints are hints: verify at the ram, close the drive-pipe valve slowly and relieve the chamber before opening
          anything. Nothing here says that water is safe to drink or that a pipe bears a pressure.
        </p>
      </footer>
    </>
  );
}

render(<Frame />, document.getElementById('page')!);
