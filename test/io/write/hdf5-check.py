"""Opens what writeHdf5 wrote with h5py and checks every value; says "as expected" when all agree."""

import sys

import h5py
import numpy as np

path = sys.argv[1]
f = h5py.File(path, "r")
assert f.attrs["default"] == "entry"
assert f.attrs["three"] == 3.0 and f.attrs["three"].dtype == "f8"
assert list(f.attrs["names"]) == ["y", "", "é × λ"]
assert np.array_equal(f.attrs["pair"], [1.5, -2])
assert f.attrs["indices"].dtype == "i4" and list(f.attrs["indices"]) == [2]
entry = f["entry"]
cube = ((np.arange(60000) * 7919) % 65521).astype("u2").reshape(30, 40, 50)
for name, chunks, compression, shuffle in (
    ("packed", (30, 40, 50), "gzip", True),
    ("ragged", (4, 7, 9), "gzip", False),
    ("tiny", (1, 1, 7), None, False),
    ("shuffled", (30, 40, 50), None, True),
    ("plain", None, None, False),
):
    data = entry[name]
    assert data.shape == cube.shape and data.chunks == chunks, name
    assert data.compression == compression and data.shuffle == shuffle, name
    assert np.array_equal(data[...], cube), name
    assert np.array_equal(data[3:9, 5:11, 20:33], cube[3:9, 5:11, 20:33]), name
assert entry["packed"].dtype == "<u2" and entry["packed"].attrs["units"] == "counts"
assert entry["plain"].dtype == "<f4"
doubles = entry["doubles"][...]
assert doubles[0] == 1.25 and np.isnan(doubles[1]) and np.signbit(doubles[2])
for name, dtype in (("bytes", "u1"), ("signed-bytes", "i1"), ("shorts", "i2"), ("words", "i4"), ("unsigned-words", "u4")):
    info = np.iinfo(dtype)
    assert entry[name].dtype == dtype and list(entry[name][...]) == [info.min, info.max], name
assert entry["scalar"][()] == 594.1 and entry["scalar"].shape == () and entry["scalar"].attrs["units"] == "nm"
assert entry["text"].asstr()[()] == "Tent field, λ"
assert list(entry["texts"].asstr()[...]) == ["a", "", "b"]
assert entry["long"].asstr()[()] == "recipe " * 300000
assert entry["empty"].shape == (0, 3)
for i in range(300):
    one = entry[f"many/map {i}"]
    assert one[()] == i and one.attrs["units"] == f"unit {i}"
f.close()

# Another program may add to the file.
f = h5py.File(path, "r+")
f["entry/added"] = [1, 2, 3]
f["entry/packed"].attrs["units"] = "electrons"
del f["entry/many/map 5"]
f.close()
f = h5py.File(path, "r")
assert list(f["entry/added"]) == [1, 2, 3] and len(f["entry/many"]) == 299
assert f["entry/packed"].attrs["units"] == "electrons" and f["entry/many/map 6"].attrs["units"] == "unit 6"
print("as expected")
