"""Writes forms.fits, a binary table with a column of every form, and forms.json, the doubles a reader must return.

Run with a Python that has astropy (5.2.1 was used). Values are given as the bits of the IEEE double, in hexadecimal,
null for a missing value, or as text for a string column. FITS Standard 4.0, sections 7.3.1 to 7.3.3.
"""
import json
import os
import struct

import numpy as np
from astropy.io import fits

HERE = os.path.dirname(os.path.abspath(__file__))
C = fits.Column
signed64 = np.array([1, -(2 ** 53) - 1, 2 ** 62 + 1, -7], dtype=np.int64)
columns = [
    C(name="TIME", format="D", unit="d", array=np.array([1.0, 1.1, 1.2, 1.3])),
    C(name="FLUX", format="E", array=np.array([1, 0.1, np.nan, -3.5], dtype=np.float32)),
    C(name="LOGIC", format="L", array=np.array([True, False, True, False])),
    C(name="BITS", format="11X", array=np.array([[i >> b & 1 for b in range(10, -1, -1)] for i in (0, 1, 1025, 2047)], dtype=bool)),
    C(name="BYTE", format="B", array=np.array([0, 1, 128, 255], dtype=np.uint8)),
    C(name="SHORT", format="I", null=-32768, array=np.array([-32768, -1, 0, 32767], dtype=np.int16)),
    C(name="USHORT", format="I", bzero=32768, array=np.array([0, 1, 32768, 65535], dtype=np.uint16)),
    C(name="INT", format="J", null=5, array=np.array([-2147483648, 5, 0, 2147483647], dtype=np.int32)),
    C(name="UINT", format="J", bzero=2147483648, array=np.array([0, 1, 2147483648, 4294967295], dtype=np.uint32)),
    C(name="WIDE", format="K", array=signed64),
    C(name="UWIDE", format="K", bzero=2 ** 63, array=np.array([0, 2 ** 63, 2 ** 63 + 2048, 2 ** 64 - 1], dtype=np.uint64)),
    C(name="WORDS", format="6A", array=np.array(["ab", "c d", "", "sixsix"])),
    C(name="VECTOR", format="3E", array=np.zeros((4, 3), dtype=np.float32)),
    C(name="COMPLEX", format="C", array=np.zeros(4, dtype=np.complex64)),
    C(name="LIST", format="PJ()", array=np.array([np.array([1]), np.array([1, 2]), np.array([3]), np.array([4])], dtype=object)),
]
empty = fits.BinTableHDU.from_columns([C(name="NOTE", format="8A", array=np.array(["x"]))], name="NOTES")
table = fits.BinTableHDU.from_columns(columns, name="FORMS")
table.header["CONTIN"] = "a long text that does not fit on one card and goes on over the next with CONTINUE, twice " * 2
table.header["HIERARCH long keyword"] = 5
fits.HDUList([fits.PrimaryHDU(), empty, table]).writeto(os.path.join(HERE, "forms.fits"), overwrite=True)


def bits(value):
    return None if value is None or np.isnan(value) else struct.pack(">d", float(value)).hex()


truth = {
    "TIME": [1.0, 1.1, 1.2, 1.3],
    "FLUX": [float(np.float32(v)) for v in (1, 0.1, np.nan, -3.5)],
    "LOGIC": [1, 0, 1, 0],
    "BITS": [0, 1, 1025, 2047],
    "BYTE": [0, 1, 128, 255],
    "SHORT": [None, -1, 0, 32767],
    "USHORT": [0, 1, 32768, 65535],
    "INT": [-2147483648, None, 0, 2147483647],
    "UINT": [0, 1, 2147483648, 4294967295],
    "WIDE": [float(v) for v in signed64.tolist()],
    "UWIDE": [0.0, float(2 ** 63), float(2 ** 63 + 2048), float(2 ** 64 - 1)],
}
out = {name: [bits(v) for v in values] for name, values in truth.items()}
out["WORDS"] = ["ab", "c d", "", "sixsix"]
with open(os.path.join(HERE, "forms.json"), "w") as handle:
    json.dump(out, handle, indent=1)
