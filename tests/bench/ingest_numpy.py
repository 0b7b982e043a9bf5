"""What ingest finds in a cube, in numpy on one thread: the reference of the ingest benchmark.

    ingest_numpy.py cube.fits folder

For every channel minimum, maximum, mean, median, rms about zero, 1.4826 times the median absolute deviation and number
of blanks; mean, median and maximum spectrum (those columns); noise of the cube from its quiet channels; total
intensity, peak, and velocity and dispersion weighted by what reaches three times the noise. Medians are exact. Planes
are read one after the other where the file keeps them so; a cube with its spectral axis first is read in bands of rows,
which are turned in memory. Prints one JSON object; leaves the maps as maps.f8 in the folder.

The noise must be known before the moments can be masked: it is taken from the same kind of sample that ingest takes,
64 channels, so that both read the whole file once.
"""

import json
import resource
import sys
import time

import numpy as np

from fits_header import read_header


def planes(data, cards, first):
    """The cube as float32 planes, one after the other."""
    scale, blank = float(cards.get("BSCALE", 1)), cards.get("BLANK")
    if first:
        ny, nx, channels = data.shape
        cube = np.empty((channels, ny, nx), "f4")
        for y in range(ny):
            cube[:, y, :] = data[y].T
        yield from cube
        return
    for plane in data:
        if data.dtype.kind == "i":
            values = plane.astype("f4") * np.float32(scale)
            values[plane == int(blank)] = np.nan
            yield values
        else:
            yield plane.astype("f4")


def robust(values):
    median = np.median(values)
    return median, 1.4826 * np.median(np.abs(values - median))


def cube_noise(noises):
    known = np.sort([n for n in noises if n])
    level = np.median(known[: -(-len(known) // 4)])
    return float(np.median(known[known <= 1.1 * level]))


def sample(data, channels, first, blank):
    noises = []
    for i in range(64):
        k = i * channels // 64
        rows = data[::4, :, k] if first else data[k, ::4]
        values = rows.astype("f4").ravel()
        noises.append(robust(values[np.isfinite(values) & (values != blank)])[1])
    return cube_noise(noises)


def main(path, folder):
    began = time.perf_counter()
    cards, offset = read_header(path)
    shape = tuple(int(cards[f"NAXIS{axis}"]) for axis in (3, 2, 1))
    first = cards["CTYPE1"] == "VRAD"
    kind = {"-32": ">f4", "16": ">i2"}[cards["BITPIX"]]
    data = np.memmap(path, kind, "r", offset, shape)
    ny, nx = (shape[0], shape[1]) if first else (shape[1], shape[2])
    channels = shape[2] if first else shape[0]
    axis = 1 if first else 3
    step = float(cards[f"CDELT{axis}"]) / 1000
    velocities = float(cards[f"CRVAL{axis}"]) / 1000 + step * np.arange(channels)
    middle = velocities[channels // 2]
    scale = float(cards.get("BSCALE", 1))
    threshold = 3 * sample(data, channels, first, float(cards.get("BLANK", "nan"))) * scale
    stats = []
    total, count = np.zeros((ny, nx)), np.zeros((ny, nx), "u4")
    peak = np.full((ny, nx), -np.inf, "f4")
    weight, moment1, moment2 = np.zeros((ny, nx)), np.zeros((ny, nx)), np.zeros((ny, nx))
    for k, plane in enumerate(planes(data, cards, first)):
        good = np.isfinite(plane)
        v = plane[good]
        median, noise = robust(v)
        rms = np.sqrt(np.square(v, dtype="f8").mean())
        stats.append([float(n) for n in (v.min(), v.max(), v.mean(dtype="f8"), median, rms, noise)])
        stats[-1].append(plane.size - v.size)
        filled = np.where(good, plane, 0)
        total += filled
        count += good
        np.fmax(peak, plane, out=peak)
        bright = np.where(filled >= threshold, filled, 0)
        weight += bright
        moment1 += bright * (velocities[k] - middle)
        moment2 += bright * (velocities[k] - middle) ** 2
    with np.errstate(invalid="ignore", divide="ignore"):
        mean = moment1 / weight
        dispersion = np.sqrt(np.maximum(moment2 / weight - mean**2, 0))
    total = np.where(count > 0, total * abs(step), np.nan)
    peak = np.where(count > 0, peak, np.nan)
    noise = cube_noise([row[5] for row in stats])
    seconds = time.perf_counter() - began

    np.stack([total, mean + middle, dispersion, peak]).astype("f8").tofile(f"{folder}/maps.f8")
    peak_bytes = 1024 * resource.getrusage(resource.RUSAGE_SELF).ru_maxrss
    print(json.dumps({"seconds": seconds, "peakBytes": peak_bytes, "stats": stats, "noise": noise, "threshold": threshold}))


if __name__ == "__main__":
    main(sys.argv[1], sys.argv[2])
