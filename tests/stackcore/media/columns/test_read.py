"""Files of columns as people and instruments write them: what is understood, what is asked, what is a fault."""

from collections.abc import Mapping

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT, SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.errors import InputError
from stackcore.media.base import Provenance
from stackcore.media.columns import ColumnsReading, read_columns
from stackcore.media.columns.read import MOST_ROWS
from stackcore.media.tabulated import TabulatedMedium

LAMINATE = TabulatedMedium((8.2e9, 12.4e9), (complex(4.31, -4.31 * 0.014), complex(4.28, -4.28 * 0.016)))
"""What every file of `CLEAR` says."""

CLEAR = {
    "commas": "f (GHz),eps_r,tan d\n8.2,4.31,0.014\n12.4,4.28,0.016\n",
    "commas and spaces": "f [GHz], eps_r, tan d\n8.2, 4.31, 0.014\n12.4, 4.28, 0.016\n",
    "semicolons and decimal commas": "f (GHz);eps_r;tan d\n8,2;4,31;0,014\n12,4;4,28;0,016\n",
    "quoted decimal commas": '"f, GHz","eps r","tan d"\n"8,2","4,31","0,014"\n"12,4","4,28","0,016"\n',
    "tabs": "f/GHz\teps'\ttan δ\n8.2\t4.31\t0.014\n12.4\t4.28\t0.016\n",
    "tabs and decimal commas": "f/GHz\tε′\ttan δ\n8,2\t4,31\t0,014\n12,4\t4,28\t0,016\n",
    "spaces": "f (GHz) eps_r tan d\n8.2 4.31 0.014\n12.4 4.28 0.016\n",
    "aligned by spaces": "  f (GHz)    eps_r    tan d\n    8.2     4.31    0.014\n   12.4     4.28    0.016\n",
    "spaces and decimal commas": "f/GHz  Dk  Df\n8,2  4,31  0,014\n12,4  4,28  0,016\n",
    "comma for everything": "f/GHz,Dk,Df\n8,2,4,31,0,014\n12,4,4,28,0,016\n",
    "comments and headings in one": "# panel 12, 23 °C\n# f (GHz)  eps_r  tan d\n8.2 4.31 0.014\n12.4 4.28 0.016\n",
    "percent sign comments": "% panel 12\n%f (GHz),eps_r,tan d\n8.2,4.31,0.014\n12.4,4.28,0.016\n",
    "exclamation mark comments": "! panel 12\n! f_GHz er tand\n8.2 4.31 0.014\n! paused\n12.4 4.28 0.016\n",
    "a title above": "Report of panel 12\n\nFreq (GHz);DK;DF\n8.2;4.31;0.014\n12.4;4.28;0.016\n",
    "a line of units": "Frequency;Permittivity;Loss tangent\nGHz;-;-\n8.2;4.31;0.014\n12.4;4.28;0.016\n",
    "units in brackets below": "Frequency,Epsilon,Loss tangent\n[MHz],[1],[%]\n8200,4.31,1.4\n12400,4.28,1.6\n",
    "hertz without a unit": "frequency,er,df\n8.2e9,4.31,0.014\n12.4E+09,4.28,0.016\n",
    "unit behind an underline": "frequency_MHz,permittivity,loss_tangent\n8200,4.31,0.014\n12400,4.28,0.016\n",
    "per mille": "f (GHz);eps;tan d (‰)\n8,2;4,31;14\n12,4;4,28;16\n",
    "Fortran exponents": "f (GHz) eps tand\n0.82D+01 4.31D0 1.4D-2\n1.24d+01 4.28d0 1.6d-2\n",
    "grouped thousands": "f (MHz);eps;tan d\n8'200;4.31;0.014\n12'400;4.28;0.016\n",
    "a minus that is none": "f (GHz)\teps\ttan d\n8.2\t4.31\t1.4e−2\n12.4\t4.28\t1.6e−2\n",
    "falling frequencies": "f (GHz),eps_r,tan d\n12.4,4.28,0.016\n8.2,4.31,0.014\n",
    "separators at the end": "f (GHz);eps_r;tan d;\n8.2;4.31;0.014;\n12.4;4.28;0.016;\n",
    "other columns": "no.,f (GHz),eps_r,tan d,temperature (°C)\n1,8.2,4.31,0.014,23\n2,12.4,4.28,0.016,23\n",
    "lines end as on old systems": "f (GHz),eps_r,tan d\r8.2,4.31,0.014\r12.4,4.28,0.016\r",
    "lines end with both signs": "f (GHz),eps_r,tan d\r\n8.2,4.31,0.014\r\n12.4,4.28,0.016\r\n",
    "a byte order mark": "\ufefff (GHz),eps_r,tan d\n8.2,4.31,0.014\n12.4,4.28,0.016\n",
    "unit of the words": "frequency in GHz;relative permittivity;loss tangent\n8,2;4,31;0,014\n12,4;4,28;0,016\n",
}


def same(found: TabulatedMedium, expected: TabulatedMedium) -> bool:
    """Return whether two tables hold the same, frequencies to the last digit and values to rounding."""
    return found.frequency == expected.frequency and np.allclose(
        found.permittivity, expected.permittivity, rtol=1e-14, atol=0
    )


@pytest.mark.parametrize("name", CLEAR)
def test_clear_files_are_understood_without_a_question(name: str) -> None:
    """Whatever the separator, decimal sign, headings and units: the same laminate, and nothing asked."""
    reading = read_columns(CLEAR[name])
    assert [*reading.questions, *reading.faults] == []
    assert same(reading.medium(), LAMINATE)


@pytest.mark.parametrize("encoding", ["utf-8", "utf-8-sig", "utf-16", "utf-16-le", "cp1252"])
def test_encodings(encoding: str) -> None:
    """Bytes of the usual encodings are the same text; one that is not UTF-8 is told."""
    content = "wavelength (µm)\tn\n0.5\t1.52\n0.6\t1.51\n".encode(encoding)
    if encoding == "utf-16-le":
        content = b"\xff\xfe" + content
    reading = read_columns(content)
    assert reading.medium().frequency == (SPEED_OF_LIGHT / 0.6e-6, SPEED_OF_LIGHT / 0.5e-6)
    assert any("Windows-1252" in note for note in reading.notes) == (encoding == "cp1252")


def test_what_was_understood_is_data() -> None:
    """The reading says separator, decimal sign, headings and columns as data and in sentences."""
    reading = read_columns("# a\nf (MHz);er;tan d (%)\n8200;4,3;1,4\n12400;4,2;1,6\n")
    assert (reading.separator, reading.decimal, reading.heading_line, reading.lines) == (
        "semicolon",
        ",",
        2,
        (3, 4),
    )
    assert [(column.kind, column.unit, column.heading) for column in reading.columns] == [
        ("frequency", "MHz", "f (MHz)"),
        ("permittivity", "", "er"),
        ("loss_tangent", "%", "tan d (%)"),
    ]
    assert list(reading.columns[0].values) == [8200, 12400]
    assert reading.understood == (
        "2 rows of 3 columns, parted by semicolons",
        "decimal comma",
        "headings in line 2",
        "column 1: frequency in MHz",
        "column 2: ε′",
        "column 3: tan δ in %",
    )


# Headings and one row -> frequency in Hz, ε, μ.
QUANTITIES = [
    ("f (GHz),e',e''", "10,4,0.2", 1e10, 4 - 0.2j, None),
    ("f (GHz);eps1;eps2", "10;-4;0.2", 1e10, -4 - 0.2j, None),
    ("f (GHz),e',e\"", "10,4,0.2", 1e10, 4 - 0.2j, None),
    ("f (GHz),eps,sigma (S/m)", "10,4,1", 1e10, complex(4, -1 / (2 * np.pi * VACUUM_PERMITTIVITY * 1e10)), None),
    ("f (GHz),eps,sigma (mS/cm)", "10,4,10", 1e10, complex(4, -1 / (2 * np.pi * VACUUM_PERMITTIVITY * 1e10)), None),
    ("lambda (nm),n,k", "500,0.5,3", SPEED_OF_LIGHT / 500e-9, (0.5 - 3j) ** 2, None),
    ("wl/um n kappa", "0.5 0.5 3", SPEED_OF_LIGHT / 0.5e-6, (0.5 - 3j) ** 2, None),
    ("E (eV) n k", "2.5 0.5 3", 2.5 * ELEMENTARY_CHARGE / PLANCK_CONSTANT, (0.5 - 3j) ** 2, None),
    ("wavenumber (cm-1),n,k", "1000,1.7,1.1", SPEED_OF_LIGHT * 1e5, (1.7 - 1.1j) ** 2, None),
    ("f_GHz,mu',mu'',eps',eps''", "1,4,0.2,9,0.1", 1e9, 9 - 0.1j, 4 - 0.2j),
    ("f_GHz,mu_r,tan dm", "1,4,0.1", 1e9, 1, 4 - 0.4j),
    ("f_GHz,mu'", "1,4", 1e9, 1, 4),
]


@pytest.mark.parametrize(("headings", "row", "frequency", "permittivity", "permeability"), QUANTITIES)
def test_quantities(
    headings: str, row: str, frequency: float, permittivity: complex, permeability: complex | None
) -> None:
    """ε, n and k, tan δ, σ and μ against frequency, wavelength, wavenumber or energy come out as ε and μ."""
    separator = next(sign for sign in ",; " if sign in row)
    first, rest = row.split(separator, 1)
    reading = read_columns(f"{headings}\n{row}\n{float(first) * 2:g}{separator}{rest}\n")
    table = reading.medium()
    place = int(np.argmin(np.abs(np.array(table.frequency) - frequency)))
    assert table.frequency[place] == pytest.approx(frequency, rel=1e-14)
    assert table.permittivity[place] == pytest.approx(permittivity, rel=1e-12)
    if permeability is None:
        assert table.permeability is None
    else:
        assert table.permeability is not None
        assert table.permeability[place] == pytest.approx(permeability, rel=1e-12)


def names(reading: ColumnsReading) -> list[str]:
    """Return the names of the questions."""
    return [question.name for question in reading.questions]


def test_without_headings_every_column_is_asked() -> None:
    """A file of bare numbers is read by what is usual, and asked about, never silently taken for it."""
    content = "8.2 4.31 0.014\n12.4 4.28 0.016\n"
    reading = read_columns(content)
    assert names(reading) == ["column 1", "unit of column 1", "column 2", "column 3"]
    assert reading.assumptions == {
        "column 1": "frequency",
        "unit of column 1": "GHz",
        "column 2": "permittivity",
        "column 3": "loss_tangent",
    }
    with pytest.raises(InputError, match="what is column 2"):
        reading.medium()
    assert same(read_columns(content, reading.assumptions).medium(), LAMINATE)


# File, name of the question, its alternatives (or some of them), what is assumed.
ASKED = [
    ("f,er\n8.2,4\n12.4,4\n", "unit of column 1", {"GHz", "MHz", "THz"}, "GHz"),
    ("f,er\n8200,4\n12400,4\n", "unit of column 1", {"GHz", "MHz", "THz"}, "MHz"),
    ("lambda,n\n0.4,1.5\n0.8,1.5\n", "unit of column 1", {"nm", "µm"}, "µm"),
    ("lambda,n\n400,1.5\n800,1.5\n", "unit of column 1", {"nm", "µm"}, "nm"),
    ("lambda,n\n4e-7,1.5\n8e-7,1.5\n", "unit of column 1", {"nm", "µm", "m"}, "m"),
    ("f (GHz),er,sigma\n8.2,4,1\n12.4,4,1\n", "unit of column 3", {"S/m", "S/cm"}, "S/m"),
    ("f (MHz);Dk\n1,234;4,310\n2,345;4,280\n", "decimal", {",", "."}, ","),
    ("8,2,4,31\n12,4,4,28\n", "separator", {"comma", "comma pairs"}, "comma"),
    ("8,2,4,01\n12,4,4,28\n", "separator", {"comma", "comma pairs"}, "comma pairs"),
    ("f (GHz),foo\n1,2\n2,2\n", "column 2", {"permittivity", "index", "ignored"}, ""),
    ("f (GHz),er,loss factor\n1,2,0.1\n2,2,0.1\n", "column 3", {"loss", "loss_tangent", "ignored"}, ""),
    ("f (GHz),er,tan d,sigma (S/m)\n1,4,0.02,0.1\n2,4,0.02,0.1\n", "loss", {"loss_tangent", "conductivity"}, ""),
    ("f (GHz),er,n\n1,4,2.1\n2,4,2.1\n", "material", {"permittivity", "index"}, "permittivity"),
    ("f (GHz),lambda (mm),er\n1,300,4\n2,150,4\n", "abscissa", {"frequency", "wavelength"}, "frequency"),
]


@pytest.mark.parametrize(("content", "name", "alternatives", "assumed"), ASKED)
def test_what_is_not_sure_is_asked(content: str, name: str, alternatives: set[str], assumed: str) -> None:
    """Each doubt is a question with alternatives and words; a medium is refused until it is answered."""
    reading = read_columns(content)
    question = next(each for each in reading.questions if each.name == name)
    assert alternatives <= {each.answer for each in question.alternatives}
    assert all(each.meaning for each in question.alternatives)
    assert question.assumed == assumed
    assert question.text
    with pytest.raises(InputError) as caught:
        reading.medium()
    assert name in [fault.path for fault in caught.value.faults]
    for alternative in alternatives:
        assert name not in names(read_columns(content, {name: alternative}))


# File, answers, frequencies in Hz, ε of the first row.
ANSWERED: list[tuple[str, Mapping[str, str], tuple[float, ...], complex]] = [
    ("f,er\n8.2,4\n12.4,5\n", {"unit of column 1": "THz"}, (8.2e12, 12.4e12), 4),
    ("f (MHz);Dk\n1,234;4,310\n2,345;4,280\n", {"decimal": "."}, (1.234e9, 2.345e9), 4310),
    ("f (MHz);Dk\n1,234;4,310\n2,345;4,280\n", {"decimal": ","}, (1.234e6, 2.345e6), 4.31),
    (
        "8,2,4,31\n12,4,4,28\n",
        {
            "separator": "comma pairs",
            "column 1": "frequency",
            "unit of column 1": "GHz",
            "column 2": "permittivity",
        },
        (8.2e9, 12.4e9),
        4.31,
    ),
    ("f (GHz),foo\n1,2\n2,2\n", {"column 2": "index"}, (1e9, 2e9), 4),
    ("f (GHz),er,foo\n1,2,7\n2,2,8\n", {"column 3": "ignored"}, (1e9, 2e9), 2),
    ("f (GHz),er,tan d,eps''\n1,4,0.02,1\n2,4,0.02,1\n", {"loss": "loss_tangent"}, (1e9, 2e9), 4 - 0.08j),
    ("f (GHz),er,n\n1,4,3\n2,4,3\n", {"material": "index"}, (1e9, 2e9), 9),
    ("f (GHz),er,tan d\n1,4,0.02\n2,4,0.02\n", {"column 3": "loss"}, (1e9, 2e9), 4 - 0.02j),
    ("f (mm),er\n3,4\n2,4\n", {"column 1": "wavelength"}, (SPEED_OF_LIGHT / 3e-3, SPEED_OF_LIGHT / 2e-3), 4),
]


@pytest.mark.parametrize(("content", "answers", "frequency", "first"), ANSWERED)
def test_answers_are_taken(
    content: str, answers: Mapping[str, str], frequency: tuple[float, ...], first: complex
) -> None:
    """An answer settles its question, and also corrects what was understood otherwise."""
    table = read_columns(content, answers).medium()
    assert table.frequency == pytest.approx(frequency, rel=1e-15)
    assert table.permittivity[0] == pytest.approx(first, rel=1e-14)


@pytest.mark.parametrize(
    ("answers", "place", "told"),
    [
        ({"unit of column 1": "GHzz"}, "unit of column 1", "'GHzz' is no unit of frequency"),
        ({"column 2": "permitivity"}, "column 2", "did you mean 'permittivity'"),
        ({"decimal": "dot"}, "decimal", "'dot' is no answer"),
        ({"separator": "colon"}, "separator", "'colon' is no answer"),
        ({"colunm 1": "frequency"}, "colunm 1", "did you mean 'column 1'"),
        ({"column 9": "frequency"}, "column 9", "no question is called"),
    ],
)
def test_answers_that_are_none(answers: Mapping[str, str], place: str, told: str) -> None:
    """An answer that is not possible is a fault with what would be, and keeps the file from becoming a medium."""
    reading = read_columns("f,er\n8.2,4\n12.4,5\n", answers)
    (fault,) = [fault for fault in reading.faults if fault.path == place]
    assert told in fault.message
    assert fault.allowed
    with pytest.raises(InputError, match=r"is no|no question"):
        reading.medium()


def test_every_fault_has_its_line() -> None:
    """Missing, surplus, negative, unsorted, doubled and unreadable cells are all told, each by line and column."""
    reading = read_columns(
        "# panel\n"
        "f (GHz),eps',eps''\n"
        "8.2,4.31,0.06\n"
        "9,nan,0.06\n"
        "9.5,,0.06\n"
        "10,4.3\n"
        "10.2,4.3,0.1,7\n"
        "11,4.3,-0.01\n"
        "10.5,4.2,0.1\n"
        "10.5,4.2,0.1\n"
        "end of data\n"
        "12,4,2,x\n"
        "13,four,0.1\n"
    )
    assert [(fault.path, fault.severity) for fault in reading.faults] == [
        ("line 4, column 2", "error"),
        ("line 5, column 2", "error"),
        ("line 6", "error"),
        ("line 7", "error"),
        ("line 11", "warning"),
        ("line 12", "error"),
        ("line 13, column 2", "error"),
        ("line 8, column 3", "error"),
        ("line 9", "error"),
        ("line 10", "error"),
    ]
    told = [fault.message for fault in reading.faults]
    assert told[0] == "a number is missing"
    assert told[3] == "4 cells where other lines have 3"
    assert told[6] == "'four' is not a number"
    assert told[8] == "10.5 GHz follows 11 GHz"
    assert told[9] == "10.5 GHz stands in line 9 already"
    assert all(fault.allowed for fault in reading.faults)
    with pytest.raises(InputError) as caught:
        reading.medium()
    assert len(caught.value.faults) == 9


def test_a_remark_between_rows_is_only_a_warning() -> None:
    """A line of words among the rows is left out and told, and the rest is still a table."""
    reading = read_columns("f (GHz),er\n1,4\nnew sample\n2,5\n")
    assert [fault.severity for fault in reading.faults] == ["warning"]
    assert reading.medium().frequency == (1e9, 2e9)


# File -> what is told.
HOPELESS = [
    ("", "no rows of numbers"),
    ("only words\nand more\n", "no rows of numbers"),
    ("1\n2\n3\n", "no rows of numbers"),
    (b"\x00\x01\x02\xff", "not a text"),
    ("f (GHz),temperature\n1,2\n2,3\n", "no column says what the material does"),
    ("er,tan d\n4,0.1\n4,0.2\n", "no column says at which frequency"),
    ("f (GHz),er\n0,4\n1,4\n", "a frequency of 0"),
    ("f (GHz),er\n-1,4\n1,4\n", "a frequency of -1"),
    ("f (GHz),er\n1,4\n", "two rows or more"),
    ("f (GHz),er,eps'\n1,4,4\n2,4,4\n", "columns 2 and 3 are both ε′"),
    ("f (mm),er\n1,4\n2,4\n", "'mm' is no unit of frequency"),
    ("f (GHz),er (mm)\n1,4\n2,4\n", "'mm' is no unit of ε′"),
    ("f (GHz),er\n1,0\n2,4\n", "a permittivity of 0"),
    ("f (GHz),n,k\n1,2,-1\n2,2,1\n", "negative, which would be gain"),
]


@pytest.mark.parametrize(("content", "told"), HOPELESS)
def test_what_is_no_table_is_told(content: str | bytes, told: str) -> None:
    """A file that cannot become a table says why, and nothing is raised until a medium is asked for."""
    reading = read_columns(content)
    with pytest.raises(InputError, match=told):
        reading.medium()


def test_too_much_is_refused(monkeypatch: pytest.MonkeyPatch) -> None:
    """A file beyond the limits is refused with the limit, rows beyond it are not kept."""
    rows = "".join(f"{1 + place * 1e-5:.5f},4\n" for place in range(MOST_ROWS + 1))
    reading = read_columns("f (GHz),er\n" + rows)
    assert [fault.message for fault in reading.faults] == [f"{MOST_ROWS + 1} rows are too many"]
    assert len(reading.lines) == MOST_ROWS
    monkeypatch.setattr("stackcore.media.columns.read.LARGEST_FILE", 10)
    assert "bytes are too many" in read_columns("f (GHz),er\n1,4\n2,4\n").faults[0].message


def test_a_loss_that_is_given_twice_is_counted_once() -> None:
    """ε″ and tan δ that agree are one loss, and said to be; that of the ε″ column is taken."""
    reading = read_columns("f (GHz),er,eps'',tan d\n1,4,0.08,0.0200\n2,4,0.081,0.0202\n")
    assert reading.medium().permittivity == (4 - 0.08j, 4 - 0.081j)
    assert any("counted once" in note for note in reading.notes)


def test_an_imaginary_part_with_its_sign() -> None:
    """A loss that is negative throughout is the imaginary part as written with exp(+jωt), and said to be."""
    reading = read_columns("f (GHz),er,eps''\n1,4,-0.08\n2,4,0\n")
    assert reading.medium().permittivity == (4 - 0.08j, 4)
    assert any("imaginary part" in note for note in reading.notes)


def test_no_loss_is_told() -> None:
    """A table without any loss is taken as lossless, and said to be."""
    for content in ("f (GHz),er\n1,4\n2,4\n", "f (GHz),n\n1,2\n2,2\n"):
        reading = read_columns(content)
        assert any("lossless" in note for note in reading.notes)
        assert reading.medium().permittivity == (4, 4)


def test_the_source_is_kept() -> None:
    """A medium made of columns has the provenance it is given."""
    told = Provenance("panel test 12")
    assert read_columns(CLEAR["tabs"]).medium(told).provenance == told


def test_frequencies_are_the_nearest_doubles() -> None:
    """8.2 GHz in a file is 8.2e9 exactly, and 0.4 µm is c over 4e-7 m."""
    assert read_columns("f (GHz),er\n8.2,4\n9.3,4\n").medium().frequency == (8.2e9, 9.3e9)
    assert read_columns("wl (µm),n\n0.4,1.5\n0.3,1.5\n").medium().frequency[0] == SPEED_OF_LIGHT / 4e-7


CELLS = st.text(st.characters(codec="utf-8", exclude_categories=["Cs"]), max_size=8)


@given(st.lists(st.lists(CELLS, min_size=1, max_size=4), max_size=6), st.sampled_from(",;\t "))
def test_no_text_is_too_odd(rows: list[list[str]], separator: str) -> None:
    """Whatever stands in a file, the reading ends with data, never with an exception."""
    content = "\n".join(separator.join(row) for row in rows)
    for reading in (
        read_columns(content),
        read_columns(content.encode()),
        read_columns("f (GHz),er\n1,2\n" + content),
    ):
        assert reading.table is not None or reading.faults or reading.questions


@given(st.binary(max_size=60))
def test_no_bytes_are_too_odd(content: bytes) -> None:
    """Bytes of any kind end with a fault, a question or a table."""
    reading = read_columns(content)
    assert reading.table is not None or reading.faults or reading.questions


@given(
    st.lists(st.tuples(st.floats(0.1, 100), st.floats(1, 20), st.floats(0, 1)), min_size=2, max_size=8),
    st.sampled_from([(",", "."), (";", "."), (";", ","), ("\t", "."), ("\t", ","), ("  ", "."), ("  ", ",")]),
)
def test_what_is_written_is_read(rows: list[tuple[float, float, float]], style: tuple[str, str]) -> None:
    """Numbers written in any style come back to the last digit, frequencies sorted beforehand."""
    separator, decimal = style
    rows = sorted({round(f, 3): (round(f, 3), e, loss) for f, e, loss in rows}.values())
    if len(rows) < 2:
        return
    lines = [separator.join(f"{value:.12f}".replace(".", decimal) for value in row) for row in rows]
    reading = read_columns("\n".join([separator.join(("f (GHz)", "eps'", "eps''")), *lines]))
    assert (reading.questions, reading.faults) == ((), ())
    assert [column.values for column in reading.columns] == [
        tuple(float(f"{row[place]:.12f}") for row in rows) for place in range(3)
    ]
