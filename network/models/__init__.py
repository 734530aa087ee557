"""Rows, and what may never be false about them."""

from network.models.acts import Act
from network.models.agency import Agency, Office
from network.models.calibrations import Calibration, CalibrationPiece, TowRun
from network.models.gauges import (
    Benchmark,
    BenchmarkElevation,
    OtherGauge,
    OtherGaugeZero,
    PlateZero,
    StaffPlate,
    StationZero,
)
from network.models.gaugings import Gauging, GaugingFinding, StageReading
from network.models.instruments import Deployment, Instrument, MeterGroup, MeterPair
from network.models.jobs import Job
from network.models.levels import LevelCheck, PegTest, Sight
from network.models.other_methods import (
    BoatTrack,
    FloatReach,
    TimedFloat,
    TracerInjection,
    TracerSample,
    VesselFill,
    WeirHead,
)
from network.models.people import Person
from network.models.plans import (
    FeedLink,
    Inspection,
    KindInterval,
    Postponement,
    Round,
    SafetyItem,
    Stop,
    StopTask,
)
from network.models.ratings import (
    Curve,
    CurveBand,
    CurveGauging,
    CurvePoint,
    CurveSegment,
    RatingPeriod,
    ShiftPoint,
    ShiftTable,
)
from network.models.records import (
    Correction,
    Dismissal,
    Infill,
    Note,
    RecordReview,
    StationYear,
    TypedFlow,
)
from network.models.sections import Channel, Transect, Vertical, VerticalPoint
from network.models.series import (
    Block,
    ImportFault,
    LoggerImport,
    MappingProfile,
    SensorSetting,
    Series,
)
from network.models.stations import Document, OperationPeriod, SiteCriterion, SiteSurvey, Station
from network.models.visits import Photograph, RecorderCheck, SpinTest, Visit, VisitReading, WorkLeft
from network.models.working_rules import WorkingRules

__all__ = [
    "Act",
    "Agency",
    "Benchmark",
    "BenchmarkElevation",
    "Block",
    "BoatTrack",
    "Calibration",
    "CalibrationPiece",
    "Channel",
    "Correction",
    "Curve",
    "CurveBand",
    "CurveGauging",
    "CurvePoint",
    "CurveSegment",
    "Deployment",
    "Dismissal",
    "Document",
    "FeedLink",
    "FloatReach",
    "Gauging",
    "GaugingFinding",
    "ImportFault",
    "Infill",
    "Inspection",
    "Instrument",
    "Job",
    "KindInterval",
    "LevelCheck",
    "LoggerImport",
    "MappingProfile",
    "MeterGroup",
    "MeterPair",
    "Note",
    "Office",
    "OperationPeriod",
    "OtherGauge",
    "OtherGaugeZero",
    "PegTest",
    "Person",
    "Photograph",
    "PlateZero",
    "Postponement",
    "RatingPeriod",
    "RecordReview",
    "RecorderCheck",
    "Round",
    "SafetyItem",
    "SensorSetting",
    "Series",
    "ShiftPoint",
    "ShiftTable",
    "Sight",
    "SiteCriterion",
    "SiteSurvey",
    "SpinTest",
    "StaffPlate",
    "StageReading",
    "Station",
    "StationYear",
    "StationZero",
    "Stop",
    "StopTask",
    "TimedFloat",
    "TowRun",
    "TracerInjection",
    "TracerSample",
    "Transect",
    "TypedFlow",
    "Vertical",
    "VerticalPoint",
    "VesselFill",
    "Visit",
    "VisitReading",
    "WeirHead",
    "WorkLeft",
    "WorkingRules",
]
