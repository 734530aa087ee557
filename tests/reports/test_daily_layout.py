"""The daily table's rows: days down, months across, decimal signs in line."""

from reports import daily_layout
from tests.reports import sample


def table(**more):
    book = sample.Sample(**more).build()
    return book, daily_layout.lay_out(book.daily.months, decimal_sign=book.agency.decimal_sign)


def test_there_are_31_rows_of_twelve_cells_and_short_months_end_blank():
    _book, laid = table()
    assert [row.day for row in laid.days] == list(range(1, 32))
    assert {len(row.cells) for row in laid.days} == {12}
    assert laid.days[30].cells[1] is daily_layout.NO_SUCH_DAY  # 31 November


def test_every_fifth_row_but_the_last_leads_the_eye():
    _book, laid = table()
    assert [row.day for row in laid.days if row.style] == [5, 10, 15, 20, 25]


def test_number_with_fewer_decimals_is_moved_left_by_as_many_digits():
    book, laid = table()
    column = [row.cells[0] for row in laid.days]  # October: 0.927 has three, 22.8 has one
    pads = {cell.text: cell.style.split() for cell in column}
    assert "pad2" in pads["22.8"]
    assert not [name for name in pads["0.927"] if name.startswith("pad")]
    assert "highest" in pads["22.8"]
    assert book.daily.months[0].highest.number.text == "22.8"


def test_stages_have_like_decimals_and_need_no_move():
    _book, laid = table(stage_only=True)
    assert not any("pad1" in cell.style for row in laid.days for cell in row.cells)
