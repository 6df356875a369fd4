"""Writes text tables in several dialects and records what Python's csv module reads from them (strict mode).

Run in the folder of this file: python3 generate_python_csv.py
Count missing and distinct values: python3 generate_python_csv.py --count penguins.csv
"""
import csv
import io
import itertools
import json
import pathlib
import random
import sys

FOLDER = pathlib.Path(__file__).parent / "PythonCsv"
PIECES = ["a", "Zürich", "x,y", "p;q", "t\tu", "v|w", 'say "so"', "two\nlines", "cr\r\nlf", "'", "1.5", "1,5", "-3", "007", "€", "日本", "é", '""', "#", "=1+1"]


def write(name, delimiter, terminator, quoting, encoding, seed):
    random_cells = random.Random(seed)
    header = ["id", "plain", 'quoted "name"', f"with{delimiter}delimiter"]
    rows = [[str(i), *("".join(random_cells.choices(PIECES, k=random_cells.randint(1, 3))) for _ in range(3))] for i in range(40)]
    text = io.StringIO(newline="")
    csv.writer(text, delimiter=delimiter, lineterminator=terminator, quoting=quoting).writerows([header, *rows])
    characters = text.getvalue()
    if encoding == "cp1252":
        characters = characters.replace("日本", "Åß")
    (FOLDER / name).write_bytes(characters.encode(encoding))
    decoded = (FOLDER / name).read_bytes().decode(encoding)
    read = list(csv.reader(io.StringIO(decoded, newline=""), delimiter=delimiter, strict=True))
    return {"file": name, "delimiter": delimiter, "encoding": {"utf-8-sig": "utf-8", "cp1252": "windows-1252"}.get(encoding, encoding), "byteOrderMark": encoding == "utf-8-sig", "header": read[0], "rows": read[1:]}


def main():
    FOLDER.mkdir(exist_ok=True)
    dialects = itertools.product(
        [("comma", ","), ("semicolon", ";"), ("tab", "\t"), ("bar", "|")],
        [("lf", "\n"), ("crlf", "\r\n")],
        [("needed", csv.QUOTE_MINIMAL), ("always", csv.QUOTE_ALL)])
    encodings = itertools.cycle(["utf-8", "cp1252", "utf-8-sig"])
    expected = [
        write(f"{delimiter[0]}-{end[0]}-{quoting[0]}-{encoding}.csv", delimiter[1], end[1], quoting[1], encoding, seed)
        for seed, ((delimiter, end, quoting), encoding) in enumerate(zip(dialects, encodings))]
    (FOLDER / "expected.json").write_text(json.dumps(expected, ensure_ascii=True, indent=1) + "\n", encoding="ascii")


def count(path):
    with open(path, newline="", encoding="utf-8") as file:
        rows = list(csv.DictReader(file))
    print(len(rows), "rows")
    for name in rows[0]:
        cells = [row[name] for row in rows if row[name] != ""]
        print(name, len(rows) - len(cells), "missing", len(set(cells)), "distinct")


if __name__ == "__main__":
    count(sys.argv[2]) if sys.argv[1:2] == ["--count"] else main()
