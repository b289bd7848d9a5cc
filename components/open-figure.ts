import type { Store } from '#src/store/store.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import { FigureDialog } from './figure-dialog.ts';

/** The element a picture is taken from. */
interface Shown {
  readonly renderRoot: HTMLElement | DocumentFragment;
  readonly store: Store | null;
  readonly picture: CrystalPicture | null;
  readonly theme: 'light' | 'dark';
}

/** Opens the dialog for a picture to take away, with the scene, camera and look as they are on screen now. */
export async function openFigure({ renderRoot, store, picture, theme }: Shown): Promise<void> {
  if (!store || !picture) return;
  const known = renderRoot.querySelector('ellipsite-figure-dialog');
  const dialog = known instanceof FigureDialog ? known : new FigureDialog();
  const { decisions, derived, look, camera } = store.state;
  dialog.scene = picture.scene;
  dialog.camera = picture.camera ?? camera;
  dialog.viewport = picture.viewport;
  dialog.look = look;
  dialog.theme = theme;
  dialog.caseTitle = decisions?.title ?? derived?.crystal?.name ?? '';
  dialog.caseText = () => store.caseText();
  if (dialog !== known) renderRoot.append(dialog);
  await dialog.updateComplete;
  dialog.open();
}
