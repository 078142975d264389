"""Reads a run's results with NumPy and h5py: prints the SHA-256 of the recipe kept in maps.h5, then "as expected"."""
import glob, hashlib, os, sys
import h5py
import numpy as np

folder = sys.argv[1]
UNITS = {
    "counts": ("total", "integral", "peak", "area"),
    "counts per channel": ("level",),
    "counts per channel per eV": ("slope",),
    "eV": ("centroid", "median", "spread", "peak_at", "centre", "fwhm"),
    "cm-1": ("centre_cm1",),
    "1": ("needed", "chi2r", "status", "iterations"),
}


def unit_of(name):
    if name.split(".")[-1] == "height":
        return "nm" if name == "scan.height" else "counts per channel"
    return next(unit for unit, names in UNITS.items() if name.split(".")[-1] in names)


with h5py.File(os.path.join(folder, "maps.h5"), "r") as h5:
    root = h5.attrs
    assert root["NX_class"] == "NXroot" and root["creator"] == "Rimlight", dict(root)
    entry = h5[root["default"]]
    assert entry.attrs["NX_class"] == "NXentry"
    scan_file = os.path.basename(entry["scan/file_name"][()].decode())
    assert scan_file == "tent-field.h5", scan_file
    assert len(entry["scan/sha256"][()]) == 64
    print(hashlib.sha256(entry["recipe/data"][()]).hexdigest())
    paths = glob.glob(os.path.join(folder, "maps", "*.npy"))
    assert len(paths) > 50, paths
    for path in paths:
        name = os.path.basename(path)[: -len(".npy")]
        array = np.load(path)
        assert array.dtype == np.dtype("<f8") and array.flags["C_CONTIGUOUS"], name
        plain = name[:-4] if name.endswith(".err") else name
        group = entry[plain]
        assert group.attrs["NX_class"] == "NXdata", name
        assert list(group.attrs["axes"]) == ["y", "x"] and group.attrs["signal"] == "data", name
        data = group["data_errors" if name.endswith(".err") else "data"]
        np.testing.assert_array_equal(data[()], array, err_msg=name)
        assert data.attrs["units"] == unit_of(plain), (name, data.attrs["units"])
        assert group["x"].shape == (array.shape[1],) and group["y"].shape == (array.shape[0],), name
        assert group["x"].attrs["units"] == "nm" and group["x"][1] == 15, name
print("as expected")
