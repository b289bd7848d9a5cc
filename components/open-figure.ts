import type { Store } from '#src/store/store.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import { FigureDialog } from './figure-dialog.ts';
import type { PicturePanel } from './picture-tools.ts';

/** The element a picture is taken from. */
interface Shown {
  readonly renderRoot: HTMLElement | DocumentFragment;
  readonly store: Store | null;
  readonly picture: CrystalPicture | null;
  readonly theme: 'light' | 'dark';
  /** The panel beside it, which would stand behind the dialog. */
  open: PicturePanel | null;
}

/** Opens the dialog for a picture to take away, with the scene, camera and look as they are on screen now. */
export async function openFigure(shown: Shown): Promise<void> {
  const { renderRoot, store, picture, theme } = shown;
  if (!store || !picture) return;
  shown.open = null;
  const known = renderRoot.querySelector('ellipsite-figure-dialog');
  const dialog = known instanceof FigureDialog ? known : new FigureDialog();
  const { decisions, derived, look, camera } = store.state;
  dialog.scene = picture.scene;
  dialog.camera = camera;
  dialog.shown = picture.camera;
  dialog.viewport = picture.viewport;
  dialog.look = look;
  dialog.theme = theme;
  dialog.caseTitle = decisions?.title ?? derived?.crystal?.name ?? '';
  dialog.caseText = () => store.caseText();
  if (dialog !== known) renderRoot.append(dialog);
  await dialog.updateComplete;
  dialog.open();
}
