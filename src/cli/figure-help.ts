/** Manual page of `figure`: its own options. */
export const figureHelp = `Usage: ellipsite figure FILE… -o picture.png [options]

Draws the crystal with its tensors, axes, colour bar and scale as a PNG, without a browser. The case is inside: the
picture can be opened like a file of its own.

  ellipsite figure crystal.cif tensors.xyz --view c --labels --width-mm 83 --dpi 300 -o crystal.png
  ellipsite figure crystal.cif tensors.xyz --width-px 1920 --height-px 1080 --theme dark -o slide.png

  -o FILE.png                where the picture goes; - is standard output
Size
  --width-mm, --height-mm    on paper; pixels = mm / 25.4 × dpi (default: 83 mm wide, height to suit)
  --dpi                      36 to 2400 (default 300 with mm); written into the file
  --width-px, --height-px    64 to 16384; without --dpi laid out as a slide 13⅓ in wide
  --text-pt                  letters at final size (default 7 on paper, 18 on a slide)
View
  --view DIRECTION           towards the viewer: a, b, c, a*, b*, c*, x, y, z, uvw:1,1,0, hkl:1,0,0,
                             each with a minus to turn it round; or a principal axis of a
                             site: "Al1 Vzz", "σ33 of Si1", "p33(Si1)", "s11 of Si1", "Si1 33"
                             (33 is of the quantity that is drawn)
  --upright                  c stays up (b along c), also where the crystal would fill the sheet better on its side
  --perspective DEGREES      0 (default) to 90
  --extent cell|molecules|asymmetric; --range 0:2,0:1,0:1; --shell SITE --radius Å
Tensors
  --quantity shielding|shift|efg
  --glyph ellipsoid|polar|axes; --part symmetric|antisymmetric; --size total|deviation
  --scale N                  ppm or a.u. that make one Å
  --colour-by isotropic|span|anisotropy|asymmetry|vzz|coupling|residual|difference|element|site
  --limits LOW,HIGH          ends of the colour bar; --map batlow|vik
  --elements Si,O; --sites Si1; --copies all|first|orientations; --no-tensors
Beside tensors
  --labels, --label-with site|element|value
  --polyhedra Si; --displacement beside|instead --probability 0.5
  --no-bonds, --no-hydrogen-bonds, --no-neighbours, --no-cell
Look
  --theme light|paper|dark; --transparent
  --outlines, --no-fading, --no-circles
  --title TEXT, --caption; --no-axes, --no-legend, --no-scale, --no-key, --no-direction
  --no-case                  leaves the case out of the file`;
