"""The cards of a FITS file, for the references that the benchmarks run in numpy."""


def read_header(path):
    """Values by keyword, quotes and comments taken off, and the byte at which the pixels begin."""
    cards, blocks = {}, 0
    with open(path, "rb") as file:
        while True:
            block = file.read(2880).decode("ascii")
            blocks += 1
            for at in range(0, 2880, 80):
                keyword, value = block[at : at + 8].strip(), block[at + 10 : at + 80]
                if keyword == "END":
                    return cards, 2880 * blocks
                cards[keyword] = value.split("/")[0].strip().strip("'").strip()
