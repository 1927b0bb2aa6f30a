"""Cuts the two weights of Farglow Sans from the variable font Inter 4.001.

    python -m pip install fonttools fontpkg-inter==4.1.post1
    python cut.py "<site-packages>/fontpkg_inter/files/Inter[opsz,wght].ttf" .

What it does: fixes the optical size at 14 and the weight at 400 and 600; gives
the digits their even-width forms, so that columns of figures align without
switching features; keeps Latin, Greek, Cyrillic, punctuation and the signs of
quantities; drops layout features (kerning among them), so that a text is as
wide in the window as it was measured for the page; renames the family, so that
it is never confused with an installed Inter.
"""

import sys

from fontTools import subset
from fontTools.ttLib import TTFont
from fontTools.varLib.instancer import instantiateVariableFont

RANGES = [
    (0x20, 0x7E), (0xA0, 0x17F), (0x18F, 0x18F), (0x192, 0x192), (0x1A0, 0x1B0), (0x1CD, 0x1E3),
    (0x1F8, 0x1FF), (0x200, 0x21B), (0x237, 0x237), (0x259, 0x259), (0x2C6, 0x2DD),
    (0x384, 0x3CE), (0x3D1, 0x3D6), (0x3F5, 0x3F5), (0x400, 0x45F), (0x490, 0x491),
    (0x1E80, 0x1E85), (0x1E9E, 0x1E9E), (0x1EA0, 0x1EF9),
    (0x2000, 0x2044), (0x2070, 0x209C), (0x20A0, 0x20BF), (0x2100, 0x215F),
    (0x2190, 0x21A0), (0x2200, 0x226B), (0x25A0, 0x25CF), (0x2605, 0x2606), (0x2610, 0x2612),
    (0x26A0, 0x26A0), (0x2713, 0x2717),
]
DIGITS = ["zero", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine"]


def cut(source, weight, style, target):
    font = instantiateVariableFont(TTFont(source, recalcTimestamp=False), {"opsz": 14, "wght": weight})
    order = set(font.getGlyphOrder())
    for table in font["cmap"].tables:
        if table.isUnicode():
            for code, name in enumerate(DIGITS, start=0x30):
                even = name + ".tf"
                assert even in order, even
                table.cmap[code] = even
            # A soft hyphen is a hyphen where it is shown at all.
            table.cmap[0xAD] = table.cmap[0x2D]
    options = subset.Options()
    options.layout_features = []
    options.drop_tables += ["GSUB", "GPOS", "GDEF", "STAT", "MVAR", "HVAR", "avar", "DSIG", "meta"]
    options.name_IDs = ["*"]
    options.notdef_outline = True
    options.hinting = False
    cutter = subset.Subsetter(options)
    cutter.populate(unicodes=[c for first, last in RANGES for c in range(first, last + 1)])
    cutter.subset(font)
    names = font["name"]
    full = "Farglow Sans " + style
    keep = {0, 5, 7, 13, 14}
    names.names = [n for n in names.names if n.nameID in keep and n.platformID == 3]
    regular = style == "Regular"
    for ident, text in {
        1: "Farglow Sans" if regular else full, 2: "Regular", 3: full + "; cut from Inter 4.001",
        4: full, 6: "FarglowSans-" + style, 16: "Farglow Sans", 17: style,
    }.items():
        names.setName(text, ident, 3, 1, 0x409)
    font["OS/2"].usWeightClass = weight
    font["OS/2"].fsSelection = (font["OS/2"].fsSelection & ~0x61) | 0x40
    font["head"].macStyle = 0
    font.save(target, reorderTables=True)


if __name__ == "__main__":
    source, folder = sys.argv[1], sys.argv[2]
    cut(source, 400, "Regular", folder + "/FarglowSans-Regular.ttf")
    cut(source, 600, "SemiBold", folder + "/FarglowSans-SemiBold.ttf")
