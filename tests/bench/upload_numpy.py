"""What ingest reduces a cube to, in numpy: the reference of the upload benchmark.

    upload_numpy.py cube.fits folder processes

Statistics of every channel (minimum, maximum, mean, rms about zero, 1.4826 times the median absolute deviation, number
of blanks), block-averaged thumbnails as 8-bit grey levels through one brightness window, the mean spectrum and the sum
over all channels. Prints one JSON object; leaves total.f8 and thumbnails.u1 in the folder. Grey levels are where numpy
ends: it has no WebP encoder, so that time is ingest's alone. So are the queue and the database.

The clock starts after the imports and stops before the results are written. Timed on its own: seconds.
"""

import json
import multiprocessing
import resource
import sys
import time

import numpy as np

from fits_header import read_header

THUMBNAIL = 96


def reduce_channels(task):
    path, offset, nx, ny, first, last = task
    block = max(1, -(-max(nx, ny) // THUMBNAIL))
    width, height = -(-nx // block), -(-ny // block)
    stats, small = [], np.empty((last - first, height, width), "f4")
    total, count = np.zeros((ny, nx)), np.zeros((ny, nx), "u4")
    padded = np.zeros((height * block, width * block))
    for channel in range(first, last):
        plane = np.fromfile(path, ">f4", nx * ny, offset=offset + 4 * nx * ny * channel).astype("f4").reshape(ny, nx)
        good = np.isfinite(plane)
        v = plane[good]
        if v.size:
            median = np.median(v)
            rms = np.sqrt(np.square(v, dtype="f8").mean())
            noise = 1.4826 * np.median(np.abs(v - median))
            numbers = [v.min(), v.max(), v.mean(dtype="f8"), rms, noise]
        stats.append([float(n) for n in numbers] if v.size else [None] * 5)
        stats[-1].append(plane.size - v.size)
        padded[:ny, :nx] = np.where(good, plane, 0)
        total += padded[:ny, :nx]
        count += good
        sums = padded.reshape(height, block, width, block).sum(axis=(1, 3))
        padded[:ny, :nx] = good
        with np.errstate(invalid="ignore"):
            small[channel - first] = sums / padded.reshape(height, block, width, block).sum(axis=(1, 3))
    return stats, small, total, count


def grey_levels(small):
    values = small[np.isfinite(small)]
    at = [min(values.size - 1, int(share * values.size)) for share in (0.01, 0.997)]
    ordered = np.partition(values, at)
    low, high = float(ordered[at[0]]), float(ordered[at[1]])
    levels = (small - low) / (high - low) * 254 + 1.5
    levels = np.where(np.isnan(levels), 0, np.clip(levels, 1, 255)).astype("u1")
    return [low, high], levels[:, ::-1]


def main(path, folder, processes):
    began = time.perf_counter()
    cards, offset = read_header(path)
    nx, ny, channels = (int(cards[f"NAXIS{axis}"]) for axis in (1, 2, 3))
    cuts = [round(i * channels / processes) for i in range(processes + 1)]
    tasks = [(path, offset, nx, ny, a, b) for a, b in zip(cuts, cuts[1:])]
    if processes == 1:
        shares = [reduce_channels(tasks[0])]
    else:
        with multiprocessing.Pool(processes) as pool:
            shares = pool.map(reduce_channels, tasks)
    stats = [row for share in shares for row in share[0]]
    small = np.concatenate([share[1] for share in shares])
    total, count = sum(share[2] for share in shares), sum(share[3] for share in shares)
    window, levels = grey_levels(small)
    total = np.where(count > 0, total, np.nan) * abs(float(cards["CDELT3"])) / 1000
    spectrum = [row[2] for row in stats]
    seconds = time.perf_counter() - began

    total.astype("f8").tofile(f"{folder}/total.f8")
    levels.tofile(f"{folder}/thumbnails.u1")
    peak = sum(resource.getrusage(who).ru_maxrss for who in (resource.RUSAGE_SELF, resource.RUSAGE_CHILDREN))
    thumbnail = [levels.shape[2], levels.shape[1]]
    print(
        json.dumps(
            {
                "seconds": seconds,
                "peakBytes": 1024 * peak,
                "stats": stats,
                "spectrum": spectrum,
                "window": window,
                "thumbnail": thumbnail,
            }
        )
    )


if __name__ == "__main__":
    main(sys.argv[1], sys.argv[2], int(sys.argv[3]))
