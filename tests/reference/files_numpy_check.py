#!/usr/bin/python3
"""The other side of files_numpy_test.cpp: trace files as NumPy and h5py write and read them.

usage: files_numpy_check.py write FOLDER   writes files and what is in them (NAME.txt, one code a line)
       files_numpy_check.py read FOLDER    reads cistern.npy and cistern.h5 and compares them with codes.txt
"""
import sys
from pathlib import Path

import h5py
import numpy

SHAPE = (5, 3, 1000)
FACTS = {"sample_rate_mhz": 100.1, "bits": 12, "live_time_s": 0.30000000000000004, "selection": "triggered_by:long",
         "contiguous": True}
LISTS = {"baseline_counts": [212, 198, 205], "height_counts_per_vem": [140.25, 138.0, 143.5],
         "area_counts_per_vem": [1020.5, 1000.0, 1040.0]}
STARTS = [1450000000123456789, -1, 0, 5, 9223372036854775807]
SIZES = [0.1, 2.0, -3.0, 1e300, 5.0]


def random_codes():
    return numpy.random.default_rng(20261201).integers(0, 4096, SHAPE)


def write_h5(path, codes, on_codes, **options):
    with h5py.File(path, "w") as file:
        data = file.create_dataset("codes", data=codes, **options)
        for name, value in {**FACTS, **LISTS}.items():
            (data if on_codes else file).attrs[name] = value
        file["start_ns"] = numpy.array(STARTS, dtype=numpy.int64)
        file["truth/size"] = numpy.array(SIZES)
        file["truth/size"].attrs["unit"] = "VEM"


def write(folder):
    codes = random_codes()
    numpy.savetxt(folder / "codes.txt", codes.reshape(-1), fmt="%d")
    numpy.save(folder / "int16.npy", codes.astype("<i2"))
    numpy.save(folder / "uint16.npy", codes.astype("<u2"))
    write_h5(folder / "int16.h5", codes.astype("<i2"), False, chunks=True, compression="gzip")
    write_h5(folder / "uint16.h5", codes.astype("<u2"), True, chunks=(2, 1, 300), compression="gzip", shuffle=True)
    write_h5(folder / "big_endian.h5", codes.astype(">i2"), False)
    numpy.save(folder / "bad_big_endian.npy", codes.astype(">i2"))
    numpy.save(folder / "bad_int32.npy", codes.astype("<i4"))
    numpy.save(folder / "bad_fortran_order.npy", numpy.asfortranarray(codes.astype("<i2")))
    numpy.save(folder / "bad_rank.npy", codes[0].astype("<i2"))
    too_large = codes.astype("<u2")
    too_large[4, 2, 999] = 32768
    numpy.save(folder / "bad_uint16.npy", too_large)
    rows = [(t, s, *codes[t, :, s]) for t in range(SHAPE[0]) for s in range(SHAPE[2])]
    numpy.savetxt(folder / "savetxt.csv", rows, fmt="%d", delimiter=",", header="trace,sample,ch0,ch1,ch2", comments="")


def expect(condition, what):
    if not condition:
        sys.exit(f"files_numpy_check.py: {what}")


def read(folder):
    codes = numpy.loadtxt(folder / "codes.txt", dtype=int).reshape(SHAPE)
    ours = numpy.load(folder / "cistern.npy", allow_pickle=False)
    expect(ours.dtype == numpy.dtype("<i2") and numpy.array_equal(ours, codes), "cistern.npy differs")
    table = numpy.loadtxt(folder / "cistern.csv", delimiter=",", dtype=int, skiprows=1 + 6)
    expect(numpy.array_equal(table[:, 2:].reshape(SHAPE[0], SHAPE[2], SHAPE[1]).transpose(0, 2, 1), codes),
           "cistern.csv differs")
    with h5py.File(folder / "cistern.h5") as file:
        data = file["codes"]
        expect(data.dtype == numpy.dtype("<i2") and numpy.array_equal(data[()], codes), "codes of cistern.h5 differ")
        expect(data.chunks is not None and data.compression == "gzip", "cistern.h5 is not chunked and compressed")
        for place in (file, data):
            for name, value in FACTS.items():
                found = place.attrs[name]
                found = found.decode() if isinstance(found, bytes) else found
                expect(found == value, f"attribute {name} is {found!r}")
            for name, values in LISTS.items():
                expect(list(place.attrs[name]) == values, f"attribute {name} is {place.attrs[name]}")
        expect(file["start_ns"].dtype == numpy.int64 and list(file["start_ns"]) == STARTS, "start_ns differs")
        size = file["truth/size"]
        unit = size.attrs["unit"]
        unit = unit.decode() if isinstance(unit, bytes) else unit
        expect(size.dtype == numpy.float64 and list(size) == SIZES and unit == "VEM", "truth differs")


{"write": write, "read": read}[sys.argv[1]](Path(sys.argv[2]))
