"""A zip made by Python's zipfile of three stored files with the earliest date, and CRC-32 values by zlib.

Run: /usr/bin/python3 test/reference/stored_zip.py
"""
import io
import json
import pathlib
import sys
import zipfile
import zlib

FILES = [("beats.csv", "time_s,class\n0.500000,N\n"), ("empty.txt", ""), ("żołądek.csv", "µV,größe\n1,2\n")]

buffer = io.BytesIO()
with zipfile.ZipFile(buffer, "w", zipfile.ZIP_STORED) as archive:
    for name, text in FILES:
        info = zipfile.ZipInfo(name, (1980, 1, 1, 0, 0, 0))
        info.create_system = 0
        archive.writestr(info, text.encode("utf-8"))
        info.external_attr = 0
texts = ["", "a", "123456789", "µV,größe\n" * 40]
json.dump(
    {
        "made_with": f"Python {sys.version.split()[0]} zipfile and zlib",
        "source": "PKWARE APPNOTE 6.3 as implemented by Python's standard library",
        "files": [{"name": name, "text": text} for name, text in FILES],
        "zip_hex": buffer.getvalue().hex(),
        "crc32": [{"text": text, "crc32": zlib.crc32(text.encode("utf-8"))} for text in texts],
    },
    (pathlib.Path(__file__).with_suffix(".json")).open("w"),
    indent=1,
)
