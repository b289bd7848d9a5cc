import type { Store } from '#src/store/store.ts';
import type { CrystalPicture } from './crystal-picture.ts';
import { FigureDialog } from './figure-dialog.ts';

/** Opens the dialog for a picture to take away, with the scene, camera and look as they are on screen now. */
export async function openFigure(
  root: HTMLElement | DocumentFragment,
  store: Store,
  picture: CrystalPicture,
  theme: 'light' | 'dark',
): Promise<void> {
  const known = root.querySelector('ellipsite-figure-dialog');
  const dialog = known instanceof FigureDialog ? known : new FigureDialog();
  const { decisions, derived, look, camera } = store.state;
  dialog.scene = picture.scene;
  dialog.camera = picture.camera ?? camera;
  dialog.viewport = picture.viewport;
  dialog.look = look;
  dialog.theme = theme;
  dialog.caseTitle = decisions?.title ?? derived?.crystal?.name ?? '';
  dialog.caseText = () => store.caseText();
  if (dialog !== known) root.append(dialog);
  await dialog.updateComplete;
  dialog.open();
}
