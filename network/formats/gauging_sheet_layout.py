"""Where everything stands in the workbook of a gauging sheet."""

from openpyxl.utils import get_column_letter

HEAD, VERTICALS, CHECK, TABLES = "Gauging", "Verticals", "Field check", "Tables"

# Page "Gauging": labels in A, values in B; stage readings below.
STATION_CODE, STATION_NAME, FORM_ID, VERSION = "B4", "B5", "B6", "B7"
DAY, STARTED, ENDED, WAY, SOUNDING, BANK = "B8", "B9", "B10", "B11", "B12", "B13"
METER, SPIN_TEST, REMARKS = "B14", "B15", "B16"
STAGE_HEADER = 18
STAGE_ROWS = range(19, 31)
RESULTS = {"area": "E5", "mid": "E6", "mean": "E7", "velocity": "E8"}
SIGNED_RESULT = "E11"

# Page "Verticals": one line an edge or a vertical, in the order measured.
FIRST_ROW, LAST_ROW = 4, 83
TABLE_ROWS = range(FIRST_ROW, LAST_ROW + 1)
COLUMNS = {
    "kind": "A",
    "distance_m": "B",
    "depth_m": "C",
    "edge": "D",
    "time": "E",
    "angle_deg": "F",
    "ice_underside_m": "G",
    "line_angle_deg": "H",
    "air_line_m": "I",
    "velocity_ms": "J",
}
NUMBERS = (
    *("distance_m", "depth_m", "angle_deg", "ice_underside_m"),
    *("line_angle_deg", "air_line_m", "velocity_ms"),
)
# Points: the usual ones first; three columns each (revolutions, seconds, velocity).
FRACTIONS = (0.2, 0.6, 0.8, 0.0, 0.4, 0.5, 1.0)
SLOTS = {
    fraction: tuple(get_column_letter(11 + 3 * place + cell) for cell in range(3))
    for place, fraction in enumerate(FRACTIONS)
}
SHARE_COLUMN = get_column_letter(11 + 3 * len(FRACTIONS))

# Page "Tables": the meter's pieces, factors, the wet line, and the lists behind the choices.
METER_KEY = "B1"
PIECES = ((2, 3, 4), "B", "C", "D")  # rows; n to, a, b
SURFACE_FACTOR, RESULT_METHOD = "B6", "B7"
WET_LINE_FIRST, WET_LINE_LAST = 2, 16  # angle in F, % in G
LIST_COLUMN = 9  # I kind, J shown, K meant
EDGE_FACTORS_COLUMN = "L"  # beside the kinds of edge
