"""Makes the shipped fonts from Inter 4.001 (SIL Open Font License): figures of one width, and only the letters needed.

    python freeze.py Inter_400Regular.ttf Inter-Regular.ttf
    python freeze.py Inter_600SemiBold.ttf Inter-SemiBold.ttf

The sources stand in the npm package @expo-google-fonts/inter 0.4.2; needs fonttools. Inter's digits differ in width unless
its feature tnum is on. The window has no such switch, so the feature's digits become the plain ones.
"""

import sys

from fontTools import subset
from fontTools.ttLib import TTFont

FIGURES = "0123456789"
RANGES = [(0x20, 0x24F), (0x370, 0x45F), (0x1E00, 0x1EFF), (0x2000, 0x20BF)]
SIGNS = "\u2113\u2122\u2190\u2191\u2192\u2193\u2212\u221a\u221e\u2248\u2260\u2264\u2265\u25b2\u25b6\u25bc\u25c0\u25cf\u26a0"


def figures_of_one_width(font):
    """From the plain glyphs to those of the feature tnum."""
    table = font["GSUB"].table
    numbers = {
        number
        for record in table.FeatureList.FeatureRecord
        if record.FeatureTag == "tnum"
        for number in record.Feature.LookupListIndex
    }
    mapping = {}
    for number in sorted(numbers):
        for part in table.LookupList.Lookup[number].SubTable:
            mapping.update(getattr(getattr(part, "ExtSubTable", part), "mapping", {}))
    return mapping


def freeze(source, target):
    """Writes the font at `source`, frozen and cut down, to `target`."""
    font = TTFont(source, recalcTimestamp=False)
    mapping = figures_of_one_width(font)
    for table in font["cmap"].tables:
        for code, glyph in list(table.cmap.items()):
            if chr(code) in FIGURES:
                table.cmap[code] = mapping.get(glyph, glyph)
    options = subset.Options()
    options.layout_features = ["kern", "mark", "mkmk", "ccmp"]
    options.name_IDs = ["*"]
    options.notdef_outline = True
    cutter = subset.Subsetter(options)
    ranges = [code for first, last in RANGES for code in range(first, last + 1)]
    cutter.populate(unicodes=ranges + [ord(sign) for sign in SIGNS])
    cutter.subset(font)
    font.save(target)


if __name__ == "__main__":
    freeze(sys.argv[1], sys.argv[2])
