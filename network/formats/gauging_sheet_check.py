"""The formulas of the field check: area, discharge and panel shares as the kernel makes them.

One row of formulas beside each row of the table. A node is an edge or a vertical with a velocity;
soundings between nodes refine the area. Letters are columns of the page "Field check".
"""

from collections.abc import Mapping

from network.formats import gauging_sheet_layout as layout

V = f"{layout.VERTICALS}!"
T = f"{layout.TABLES}!"
PAGE = f"'{layout.CHECK}'!"
POINT_COLUMNS = {0.0: "H", 0.2: "I", 0.4: "J", 0.5: "K", 0.6: "L", 0.8: "M", 1.0: "N"}
COLUMNS = {
    "edge": "A",  # 1 in a row of an edge
    "first": "B",  # 1 at the first edge of a channel
    "node": "C",
    "x": "D",
    "correct": "E",  # depth with the line corrections
    "d": "F",  # depth of flowing water
    "wet": "G",  # wet-line correction, %
    "code": "O",  # which points were measured, seven digits from the surface to the bed
    "vm": "P",  # mean velocity of a vertical
    "u": "Q",  # velocity of a node
    "cum": "R",  # area from the first edge up to here
    "pd": "S",  # depth, velocity, area and kind of the last node up to here
    "pv": "T",
    "pc": "U",
    "pe": "V",
    "nv": "W",  # velocity of the next vertical from here
    "za": "X",  # area of the zone that ends here
    "near": "Y",  # the part of it that belongs to the node before
    "qmid": "Z",
    "qmean": "AA",
    "back": "AB",  # mid-section flow of the next zone that belongs to the vertical before it
    "panel": "AC",
    "isv": "AD",
}
HEADER_ROW = layout.FIRST_ROW - 1


def formulas(row: int) -> Mapping[str, str]:
    """Return the formulas of a row by their column letter."""
    own, before, after = (_names(r) for r in (row, row - 1, row + 1))
    cell = {name: f"{V}{column}{row}" for name, column in layout.COLUMNS.items()}
    made = {
        **_section(own, before, cell, row),
        **_velocities(own, cell, row),
        **_zones(own, before, after, cell),
    }
    return {COLUMNS.get(name, name): f"={text}" for name, text in made.items()}


def results() -> Mapping[str, str]:
    """Return the formulas of the results by their name."""
    panels = _column("panel")
    return {
        "area": f"=SUM({_column('za')})",
        "mid": f"=SUM({_column('qmid')})",
        "mean": f"=SUM({_column('qmean')})",
        "velocity": (
            f'=IF(SUM({_column("za")})>0,IF({T}{layout.RESULT_METHOD}="mid",SUM({panels}),'
            f"SUM({_column('qmean')}))/SUM({_column('za')}),0)"
        ),
    }


def share(row: int) -> str:
    """Return the formula of a vertical's part of the flow, in %."""
    total = f"SUM({_column('qmid')})"
    isv, panel = (f"{PAGE}{COLUMNS[name]}{row}" for name in ("isv", "panel"))
    return f'=IF(AND({isv}=1,{total}<>0),100*{panel}/{total},"")'


def _section(
    own: Mapping[str, str], before: Mapping[str, str], cell: Mapping[str, str], row: int
) -> dict[str, str]:
    kinds = f"{V}A${layout.FIRST_ROW}:A{row}"
    angles, percents = (
        f"{T}${column}${layout.WET_LINE_FIRST}:${column}${layout.WET_LINE_LAST}" for column in "FG"
    )
    at = f"MATCH({cell['line_angle_deg']},{angles},1)"
    last = layout.WET_LINE_LAST - layout.WET_LINE_FIRST + 1
    up = f"MIN({at}+1,{last})"
    rise = f"(INDEX({percents},{up})-INDEX({percents},{at}))"
    run = f"MAX(INDEX({angles},{up})-INDEX({angles},{at}),0.001)"
    past = f"({cell['line_angle_deg']}-INDEX({angles},{at}))"
    wet = f"INDEX({percents},{at})+{past}*{rise}/{run}"
    slant = f"{cell['air_line_m']}*(1/COS(RADIANS({cell['line_angle_deg']}))-1)"
    ice = f"{cell['ice_underside_m']}"
    return {
        "edge": f"IF(AND({_is_edge(cell)},ISNUMBER({cell['distance_m']})),1,0)",
        "first": f"IF({own['edge']}=1,MOD(COUNTIF({kinds},{_edge_word()}),2),0)",
        "x": f'IF(ISNUMBER({cell["distance_m"]}),{cell["distance_m"]},"")',
        "wet": f"IF(ISNUMBER({cell['line_angle_deg']}),{wet},0)",
        "correct": (
            f"IF(ISNUMBER({cell['line_angle_deg']}),"
            f"({cell['depth_m']}-{slant})*(1-{own['wet']}/100),{cell['depth_m']}+0)"
        ),
        "d": f'IF({own["x"]}="","",{own["correct"]}-IF(ISNUMBER({ice}),{ice},0))',
        "cum": (
            f'IF({own["x"]}="",{before["cum"]},IF({own["first"]}=1,0,'
            f"{before['cum']}+ABS({own['x']}-{_last(row, 'x')})*"
            f"({own['d']}+{_last(row, 'd')})/2))"
        ),
    }


def _velocities(own: Mapping[str, str], cell: Mapping[str, str], row: int) -> dict[str, str]:
    made = {}
    for fraction, (revolutions, seconds, velocity) in layout.SLOTS.items():
        turns, time, given = (f"{V}{column}{row}" for column in (revolutions, seconds, velocity))
        counted = f'IF(AND(ISNUMBER({turns}),ISNUMBER({time})),{_rated(turns, time)},"")'
        made[POINT_COLUMNS[fraction]] = f"IF(ISNUMBER({given}),{given},{counted})"
    points = {fraction: f"{column}{row}" for fraction, column in POINT_COLUMNS.items()}
    made["code"] = "&".join(f'IF(ISNUMBER({points[f]}),"1","0")' for f in sorted(points))
    slant = f"COS(RADIANS({cell['angle_deg']}))"
    made["vm"] = (
        f'IF(OR({own["edge"]}=1,{own["x"]}=""),"",IF({own["code"]}="0000000",'
        f'IF(ISNUMBER({cell["velocity_ms"]}),{cell["velocity_ms"]}*{slant},""),'
        f"{_mean(own['code'], points, ice=cell['ice_underside_m'])}*{slant}))"
    )
    made["isv"] = f"IF(ISNUMBER({own['vm']}),1,0)"
    made["node"] = f"IF({own['edge']}+{own['isv']}>0,1,0)"
    return made


def _zones(
    own: Mapping[str, str],
    before: Mapping[str, str],
    after: Mapping[str, str],
    cell: Mapping[str, str],
) -> dict[str, str]:
    kinds = f"{T}$J$2:$J$60"
    factors = f"{T}${layout.EDGE_FACTORS_COLUMN}$2:${layout.EDGE_FACTORS_COLUMN}$60"
    sloping = f"INDEX({factors},MATCH({T}$B$8,{kinds},0))"
    chosen = f"INDEX({factors},MATCH({cell['edge']},{kinds},0))"
    factor = f'IF({cell["edge"]}="",{sloping},{chosen})'
    nearest = f"IF({own['first']}=1,{after['nv']},{before['pv']})"
    at_edge = f"IF(ISNUMBER({cell['velocity_ms']}),{cell['velocity_ms']},(2*{factor}-1)*{nearest})"
    both = f"({before['pd']}+{own['d']})"
    ends_zone = f"AND({own['node']}=1,{own['first']}=0)"
    whole = f"{before['pv']}*{own['near']}+{own['u']}*({own['za']}-{own['near']})"
    return {
        "u": f'IF({own["edge"]}=1,{at_edge},IF({own["isv"]}=1,{own["vm"]},""))',
        "nv": f"IF({own['isv']}=1,{own['vm']},IF({own['edge']}=1,0,{after['nv']}))",
        **{
            name: f"IF({own['node']}=1,{own[value]},{before[name]})"
            for name, value in (("pd", "d"), ("pv", "u"), ("pc", "cum"), ("pe", "edge"))
        },
        "za": f"IF({ends_zone},{own['cum']}-{before['pc']},0)",
        "near": f"IF({own['za']}>0,IF({both}>0,{before['pd']}/{both},0.5)*{own['za']},0)",
        "qmid": f"IF({ends_zone},{whole},0)",
        "qmean": f"IF({ends_zone},({before['pv']}+{own['u']})/2*{own['za']},0)",
        "back": (
            f"IF({own['first']}=1,0,IF({own['node']}=1,"
            f"IF({own['edge']}=1,{own['qmid']},{before['pv']}*{own['near']}),{after['back']}))"
        ),
        "panel": (
            f"IF({own['isv']}=1,IF({before['pe']}=1,{own['qmid']},"
            f"{own['u']}*({own['za']}-{own['near']}))+{after['back']},0)"
        ),
    }


def _rated(turns: str, time: str) -> str:
    """v = a + b·n of the piece that holds n; 0 for a still rotor."""
    n = f"({turns}/{time})"
    rows, to, a, b = layout.PIECES
    lines = [f"{T}${a}${row}+{T}${b}${row}*{n}" for row in rows]
    ends = [f"{T}${to}${row}" for row in rows]
    return f"IF({turns}=0,0,IF({n}<={ends[0]},{lines[0]},IF({n}<={ends[1]},{lines[1]},{lines[2]})))"


def _mean(code: str, v: Mapping[float, str], *, ice: str) -> str:
    """The mean velocity by the points that were measured (factors under ice: ISO 9196)."""
    under_ice = f"IF(ISNUMBER({ice}),{ice},0)>0"
    five = f"{v[0.0]}+3*{v[0.2]}+3*{v[0.6]}+2*{v[0.8]}+{v[1.0]}"
    six = f"{v[0.0]}+2*{v[0.2]}+2*{v[0.4]}+2*{v[0.6]}+2*{v[0.8]}+{v[1.0]}"
    methods = (
        ("0000100", f"{v[0.6]}*IF({under_ice},0.92,1)"),
        ("0001000", f"{v[0.5]}*IF({under_ice},0.88,0.95)"),
        ("0100010", f"({v[0.2]}+{v[0.8]})/2"),
        ("0100110", f"({v[0.2]}+2*{v[0.6]}+{v[0.8]})/4"),
        ("1100111", f"({five})/10"),
        ("1110111", f"({six})/10"),
        ("1000000", f"{v[0.0]}*{T}${layout.SURFACE_FACTOR[0]}${layout.SURFACE_FACTOR[1:]}"),
    )
    text = '""'
    for name, mean in methods:
        text = f'IF({code}="{name}",{mean},{text})'
    return text


def _names(row: int) -> dict[str, str]:
    return {name: f"{column}{row}" for name, column in COLUMNS.items()}


def _column(name: str) -> str:
    column = COLUMNS[name]
    return f"{PAGE}{column}${layout.FIRST_ROW}:{column}${layout.LAST_ROW}"


def _is_edge(cell: Mapping[str, str]) -> str:
    return f"{cell['kind']}={_edge_word()}"


def _edge_word() -> str:
    return f"{T}$B$9"


def _last(row: int, name: str) -> str:
    """The row above: a table has no empty lines between its first and its last one."""
    return f"{COLUMNS[name]}{row - 1}"
