import './theme/fonts.css';
import './theme/base.css';
import { StrictMode, useLayoutEffect } from 'react';
import { createRoot } from 'react-dom/client';
import { type Controller, createController } from './desk/controller';
import { ControllerProvider } from './desk/controller-context';
import { Desk } from './desk/Desk';
import { DEMOS } from './desk/demos';
import { createClock } from './store/clock';
import { type DeskContext, DeskProvider } from './store/context';
import { createDeskStore } from './store/store';
import { paletteOf, usePalette } from './theme/palette';
import { applyTheme, NIGHT } from './theme/tokens';
import { createWorkerClient, openWorkerPort } from './worker/client';

/** The worker starts before anything is drawn, and the first demo runs while the page is laid out. */
const client = createWorkerClient(openWorkerPort);
const desk: DeskContext = { store: createDeskStore(), clock: createClock() };
const controller = createController({
  ...desk,
  client,
  now: () => new Date().toISOString(),
  save,
  async drawPlate(report, trajectory) {
    const [{ makePlate }, { getSceneSource }] = await Promise.all([
      import('./plate/make-plate'),
      import('./plate/scene-source'),
    ]);
    const { theme, spread, clones, plateFindings, sunStation, earthStation, namedDistances } =
      desk.store.getState();
    return makePlate({
      report,
      trajectory,
      spread,
      clones,
      palette: paletteOf(theme),
      clockTdbSeconds: desk.clock.tdbSeconds,
      findings: plateFindings,
      scenes: getSceneSource(),
      sunStation,
      earthStation,
      namedDistances,
    });
  },
});
controller.setText(DEMOS[0].text, 'replaced');

const root = document.getElementById('root');
if (root === null) throw new Error('The page has no element with the id "root".');
createRoot(root).render(
  <StrictMode>
    <Page desk={desk} controller={controller} />
  </StrictMode>,
);

function Page(props: { desk: DeskContext; controller: Controller }) {
  return (
    <DeskProvider value={props.desk}>
      <ControllerProvider value={props.controller}>
        <Theme />
        <Desk />
      </ControllerProvider>
    </DeskProvider>
  );
}

/** Dresses the page in the palette in force. */
function Theme() {
  const palette = usePalette();
  useLayoutEffect(() => {
    const page = document.documentElement;
    applyTheme(page, palette);
    page.style.colorScheme = palette === NIGHT ? 'dark' : 'light';
    for (const meta of document.querySelectorAll('meta[name="theme-color"]')) {
      meta.setAttribute('content', palette.ground);
    }
  }, [palette]);
  return null;
}

function save(fileName: string, content: Blob): void {
  const url = URL.createObjectURL(content);
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  // The download has its own hold on the content once the click has been handled.
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
}
