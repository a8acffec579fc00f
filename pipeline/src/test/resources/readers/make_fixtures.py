"""Writes the HDF5 files beside this script, with h5py 3.7 on HDF5 1.10 (invented data). Run: python3 make_fixtures.py

All hold the same two-point function of 6 configurations, 3 sources (t0 = 0, 3, 6) and T = 8 time slices. Relative to the source,
    C(c, s, t) = (1 + 7 c + 3 s) / (t + 1.5),
stored on the lattice's own time axis, with the sign -1 on slices beyond the boundary. Imaginary parts are 1e6 everywhere, so that
a reader that takes them is seen at once.
"""
import os
import subprocess
import sys

import h5py
import numpy as np

HERE = os.path.dirname(os.path.abspath(__file__))
T, T0, N = 8, [0, 3, 6], 6
data = np.empty((N, len(T0), T))
for c in range(N):
    for s, t0 in enumerate(T0):
        for t in range(T):
            data[c, s, (t0 + t) % T] = (1 + 7 * c + 3 * s) / (t + 1.5) * (-1 if t0 + t >= T else 1)


def new(name, **options):
    return h5py.File(os.path.join(HERE, name), "w", **options)


def labels(f):
    f["labels/trajectory"] = np.arange(10, 10 * N + 1, 10, dtype="i4")
    f["labels/trajectory_big"] = np.arange(10, 10 * N + 1, 10).astype(">i8")
    f["labels/stream"] = np.array([b"a"] * N, dtype="S4")
    f.create_dataset("labels/stream_text", data=["a"] * N, dtype=h5py.string_dtype())
    f["labels/sources"] = np.array(T0, dtype="u1")
    f["labels/sources_each"] = np.array([T0] * N, dtype=">i2")


def compound(real, offsets, size, kind):
    d = np.zeros(data.shape, dtype={"names": list(real), "formats": [kind, kind], "offsets": offsets, "itemsize": size})
    d[real[0] if real[0].startswith("r") else real[1]] = data
    d[real[1] if real[0].startswith("r") else real[0]] = 1e6
    return d


trailing = np.stack([data, np.full(data.shape, 1e6)], axis=-1)

with new("forms.h5") as f:
    labels(f)
    f["float64"] = data
    f["float64_big"] = data.astype(">f8")
    f["float32"] = data.astype("f4")
    f["float32_big"] = data.astype(">f4")
    f["compound_re_im"] = compound(("re", "im"), [0, 8], 16, "f8")
    f["compound_padded"] = compound(("i", "r"), [16, 4], 24, ">f8")
    f["compound32"] = compound(("r", "i"), [0, 4], 8, "f4")
    f["trailing"] = trailing
    f["trailing32_big"] = trailing.astype(">f4")
    f["time_config_source"] = np.ascontiguousarray(data.transpose(2, 0, 1))
    f["source_time_config"] = np.ascontiguousarray(data.transpose(1, 2, 0))
    f.create_dataset("chunked", data=data, chunks=(2, 3, 8))
    f.create_dataset("chunked_edges", data=data, chunks=(4, 2, 5), compression="gzip", shuffle=True)
    f.create_dataset("chunked_big", data=data.astype(">f8"), chunks=(5, 1, 3), compression="lzf")
    f.create_dataset("chunked_checksum", data=data, chunks=(5, 1, 3), compression="gzip", fletcher32=True)
    # Chunks of a few bytes cannot be compressed: LZF leaves them raw and says so in each chunk's filter mask.
    f.create_dataset("chunked_raw", data=data, chunks=(1, 1, 1), compression="lzf")
    f.create_dataset("chunked_raw_shuffled", data=data, chunks=(1, 1, 2), compression="lzf", shuffle=True)
    f.create_dataset("chunked_compound", data=f["compound_padded"][...], chunks=(4, 2, 5), compression="gzip")
    f.create_dataset("chunked_trailing", data=trailing, chunks=(4, 2, 5, 2), compression="gzip")
    f.create_dataset("chunked_split_pairs", data=trailing, chunks=(4, 2, 5, 1))
    f.create_dataset("chunked_time_config_source", data=data.transpose(2, 0, 1), chunks=(3, 4, 2), compression="gzip")
    f.create_dataset("chunked_source_time_config", data=data.transpose(1, 2, 0), chunks=(2, 3, 4))
    plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
    plist.set_layout(h5py.h5d.COMPACT)
    space = h5py.h5s.create_simple(data.shape)
    compact = h5py.h5d.create(f.id, b"compact", h5py.h5t.IEEE_F64BE, space, plist)
    compact.write(h5py.h5s.ALL, h5py.h5s.ALL, np.ascontiguousarray(data))
    f["soft"] = h5py.SoftLink("/deep/er/link")
    f["deep/er/link"] = h5py.SoftLink("/float64")
    f["inner"] = h5py.SoftLink("deep/er")
    f.create_dataset("labels/trajectory_chunked", data=np.arange(10, 10 * N + 1, 10), maxshape=(None,), chunks=(4,))
    f["labels/trajectory_text"] = np.array([b"10", b"020", b"30", b"40", b"50", b"60"], dtype="S3")
    hits = f.create_dataset("hits", shape=(N, T, 3), dtype="f4", chunks=(2, T, 3))
    hits[...] = np.arange(N)[:, None, None] + 10 * np.arange(T)[None, :, None] + 2 * np.arange(3)[None, None, :]
    # Connected insertions at separation 3: data read as the insertion's time axis, or its first four slices relative to the source
    f["connected"] = np.stack([[[data[c, s, (t0 + t) % T] for t in range(4)] for s, t0 in enumerate(T0)] for c in range(N)])
    f["text"] = np.array([b"no", b"numbers"], dtype="S8")

with new("user_block.h5", userblock_size=1024, libver="latest") as f:
    labels(f)
    f["float64"] = data
    f["compound"] = compound(("im", "re"), [0, 8], 16, "f8")
    f.create_dataset("chunked", data=data, chunks=(2, 3, 8), maxshape=(None, 3, 8), compression="gzip")

with new("damaged.h5") as f:
    labels(f)
    half = f.create_dataset("half_written", shape=data.shape, chunks=(2, 3, 8), fillvalue=np.nan)
    half[:4] = data[:4]
    part = f.create_dataset("part_written", shape=data.shape, chunks=(2, 1, 8), compression="gzip")
    part[:, :2] = data[:, :2]
    part[:4, 2] = data[:4, 2]
    f.create_dataset("never_written", shape=data.shape)
    bad = data.copy()
    bad[2, 1, 5] = np.nan
    bad[2, 1, 6] = np.inf
    f["not_finite"] = bad
    f["loop_a"] = h5py.SoftLink("/loop_b")
    f["loop_b"] = h5py.SoftLink("/loop_a")
    f["outside"] = h5py.ExternalLink("forms.h5", "/float64")
    f["labels/doubled"] = np.array([10, 20, 30, 20, 50, 60])
    f.create_group("cycle/inner")
    f["cycle/inner/self"] = f["cycle"]
    some = f.create_dataset("labels/some", shape=(N,), dtype="i8", chunks=(2,), fillvalue=7)
    some[:2] = [10, 20]
    f["labels/half"] = np.array([10, 20, 30.5, 40, 50, 60])

with new("unsupported.h5") as f:
    labels(f)
    f.create_dataset("scaled", data=(data * 1000).astype("i4"), chunks=(2, 3, 8), scaleoffset=0)
    f.create_dataset("lzf_checksum", data=data, chunks=(5, 1, 3), compression="lzf", fletcher32=True)

with new("virtual.h5") as f:
    labels(f)
    layout = h5py.VirtualLayout(shape=data.shape, dtype="f8")
    layout[...] = h5py.VirtualSource("forms.h5", "float64", shape=data.shape)
    f.create_virtual_dataset("virtual", layout)
    f["float64"] = data

subprocess.run([sys.executable, "-c", """
import h5py, os, sys
f = h5py.File(sys.argv[1], "w", libver="latest")
f["float64"] = [1.0, 2.0]
f.swmr_mode = True
f.flush()
os._exit(0)
""", os.path.join(HERE, "left_open.h5")], check=False)
