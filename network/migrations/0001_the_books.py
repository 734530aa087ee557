# Folded from Django's own 5.2.19 on 2026-12-01 11:33

import django.contrib.auth.models
import django.contrib.auth.validators
import django.core.validators
import django.db.models.constraints
import django.db.models.deletion
import django.utils.timezone
import network.models.acts
import simple_history.models
import uuid
from django.conf import settings
from django.db import migrations, models


class CreateTogether(migrations.SeparateDatabaseAndState):
    """Create many related models and render their state once.

    One by one, every new model renders all that are related to it again: a minute for these.
    """

    def state_forwards(self, app_label, state):
        state.__dict__.pop("apps", None)
        super().state_forwards(app_label, state)

    def database_forwards(self, app_label, schema_editor, from_state, to_state):
        for operation in self.state_operations:
            schema_editor.create_model(to_state.apps.get_model(app_label, operation.name))

    def database_backwards(self, app_label, schema_editor, from_state, to_state):
        for operation in reversed(self.state_operations):
            schema_editor.delete_model(from_state.apps.get_model(app_label, operation.name))


class Migration(migrations.Migration):
    initial = True

    dependencies = [
        ("auth", "0012_alter_user_first_name_max_length"),
    ]

    operations = [
        CreateTogether(
            state_operations=[
                migrations.CreateModel(
                    name="Office",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("address", models.TextField(blank=True, verbose_name="address")),
                        (
                            "latitude_deg",
                            models.FloatField(blank=True, null=True, verbose_name="latitude, °"),
                        ),
                        (
                            "longitude_deg",
                            models.FloatField(blank=True, null=True, verbose_name="longitude, °"),
                        ),
                    ],
                    options={
                        "verbose_name": "office",
                        "verbose_name_plural": "offices",
                        "ordering": ["name"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("name",),
                                name="network_office_name_once",
                                violation_error_message="There is already an office of this name.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Station",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("code", models.CharField(max_length=20, verbose_name="code")),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("river", models.CharField(max_length=120, verbose_name="river")),
                        (
                            "basin",
                            models.CharField(blank=True, max_length=120, verbose_name="basin"),
                        ),
                        ("latitude_deg", models.FloatField(verbose_name="latitude, °")),
                        ("longitude_deg", models.FloatField(verbose_name="longitude, °")),
                        (
                            "catchment_km2",
                            models.FloatField(
                                blank=True, null=True, verbose_name="catchment area, km²"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("discharge", "stage–discharge station"),
                                    ("stage", "stage-only station"),
                                    ("weir", "weir"),
                                ],
                                default="discharge",
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "unrated_because",
                            models.CharField(
                                blank=True,
                                choices=[
                                    ("backwater", "variable backwater"),
                                    ("velocity", "index velocity"),
                                    ("tidal", "tide"),
                                ],
                                help_text="Such a station keeps its stage record and gaugings; it is not rated here.",
                                max_length=10,
                                verbose_name="no single rating because of",
                            ),
                        ),
                        ("control", models.TextField(blank=True, verbose_name="control")),
                        ("description", models.TextField(blank=True, verbose_name="description")),
                        ("highlights", models.TextField(blank=True, verbose_name="what stood out")),
                        ("hazards", models.TextField(blank=True, verbose_name="hazards")),
                        ("safety_notes", models.TextField(blank=True, verbose_name="safety notes")),
                        ("access_notes", models.TextField(blank=True, verbose_name="access")),
                        (
                            "visit_interval_days",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="routine visit every, days"
                            ),
                        ),
                        (
                            "level_check_interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="level check every, months"
                            ),
                        ),
                        (
                            "gaugings_wanted_per_year",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="gaugings wanted a year"
                            ),
                        ),
                        ("record_version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "office",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "station",
                        "verbose_name_plural": "stations",
                        "ordering": ["code"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("code",),
                                name="network_station_code_once",
                                violation_error_message="There is already a station with this code.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("latitude_deg__range", (-90, 90)),
                                    ("longitude_deg__range", (-180, 180)),
                                ),
                                name="network_station_on_earth",
                                violation_error_message="Latitude lies within ±90°, longitude within ±180°.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("catchment_km2__isnull", True),
                                    ("catchment_km2__gt", 0),
                                    _connector="OR",
                                ),
                                name="network_station_catchment_positive",
                                violation_error_message="The catchment area is above zero.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Benchmark",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("label", models.CharField(max_length=40, verbose_name="label")),
                        ("description", models.TextField(blank=True, verbose_name="description")),
                        (
                            "is_main",
                            models.BooleanField(default=False, verbose_name="levels start here"),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="benchmarks",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "benchmark",
                        "verbose_name_plural": "benchmarks",
                        "ordering": ["station", "label"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "label"),
                                name="network_benchmark_label_once",
                                violation_error_message="This station already has a benchmark of that label.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Instrument",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("float", "float recorder in a stilling well"),
                                    ("bubbler", "gas bubbler"),
                                    ("pressure", "pressure recorder"),
                                    ("radar", "radar recorder"),
                                    ("body", "current meter body"),
                                    ("rotor", "current meter rotor"),
                                    ("acoustic", "acoustic profiler"),
                                    ("em", "electromagnetic meter"),
                                    ("level", "level"),
                                    ("staff", "levelling staff"),
                                    ("salt", "conductivity meter"),
                                    ("winch", "winch and weight"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "maker",
                            models.CharField(blank=True, max_length=80, verbose_name="maker"),
                        ),
                        (
                            "model",
                            models.CharField(blank=True, max_length=80, verbose_name="model"),
                        ),
                        ("serial", models.CharField(max_length=60, verbose_name="serial number")),
                        (
                            "status",
                            models.CharField(
                                choices=[
                                    ("service", "in service"),
                                    ("calibration", "in for calibration"),
                                    ("spare", "spare"),
                                    ("withdrawn", "withdrawn"),
                                ],
                                default="service",
                                max_length=12,
                                verbose_name="status",
                            ),
                        ),
                        (
                            "interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="calibrate every, months"
                            ),
                        ),
                        (
                            "interval_hours",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="calibrate every, hours of use"
                            ),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "office",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "instrument",
                        "verbose_name_plural": "instruments",
                        "ordering": ["kind", "serial"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("kind", "maker", "serial"),
                                name="network_instrument_serial_once",
                                violation_error_message="There is already an instrument of this kind, maker and serial number.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="OtherGauge",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("wire", "wire-weight gauge"),
                                    ("dipper", "dipper"),
                                    ("crest", "crest gauge"),
                                    ("mark", "flood mark"),
                                ],
                                max_length=8,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=40, verbose_name="label")),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="other_gauges",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "other gauge",
                        "verbose_name_plural": "other gauges",
                        "ordering": ["station", "label"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "label"),
                                name="network_othergauge_label_once",
                                violation_error_message="This station already has a gauge of that label.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="SafetyItem",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("cableway", "cableway"),
                                    ("walkway", "walkway"),
                                    ("ladder", "ladder"),
                                    ("well", "stilling well"),
                                    ("boat", "boat"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=60, verbose_name="label")),
                        (
                            "interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="inspect every, months"
                            ),
                        ),
                        (
                            "removed_on",
                            models.DateField(blank=True, null=True, verbose_name="removed"),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="safety_items",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "safety item",
                        "verbose_name_plural": "safety items",
                        "ordering": ["station", "label"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "label"),
                                name="network_safetyitem_label_once",
                                violation_error_message="This station already has an item of that label.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Series",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("recorder", "recorder"),
                                    ("second", "second recorder"),
                                    ("observer", "observer's readings"),
                                ],
                                default="recorder",
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=60, verbose_name="label")),
                        ("is_primary", models.BooleanField(default=False, verbose_name="primary")),
                        (
                            "gap_limit_minutes",
                            models.PositiveIntegerField(
                                default=180,
                                verbose_name="longest step bridged by a straight line, minutes",
                            ),
                        ),
                        (
                            "is_event_logger",
                            models.BooleanField(
                                default=False,
                                help_text="The silence of such a logger is not a gap.",
                                verbose_name="records only changes",
                            ),
                        ),
                        (
                            "sensor_lowest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="sensor's range from, m"
                            ),
                        ),
                        (
                            "sensor_highest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="sensor's range to, m"
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="series",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "series",
                        "verbose_name_plural": "series",
                        "ordering": ["station", "-is_primary", "label"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "label"),
                                name="network_series_label_once",
                                violation_error_message="This station already has a series of that label.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("is_primary", True)),
                                fields=("station",),
                                name="network_series_one_primary",
                                violation_error_message="A station has one primary series.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("gap_limit_minutes__gt", 0)),
                                name="network_series_gap_limit",
                                violation_error_message="The gap limit is above zero.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="StaffPlate",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("label", models.CharField(max_length=20, verbose_name="label")),
                        ("lowest_m", models.FloatField(verbose_name="lowest graduation, m")),
                        ("highest_m", models.FloatField(verbose_name="highest graduation, m")),
                        (
                            "step_m",
                            models.FloatField(
                                default=0.01, verbose_name="step of the graduation, m"
                            ),
                        ),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        (
                            "is_usual",
                            models.BooleanField(default=False, verbose_name="usually read"),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="plates",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "staff plate",
                        "verbose_name_plural": "staff plates",
                        "ordering": ["station", "label"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "label", "installed_at"),
                                name="network_staffplate_label_once",
                                violation_error_message="This station already has a plate of that label.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("highest_m__gt", models.F("lowest_m"))),
                                name="network_staffplate_range",
                                violation_error_message="The highest graduation lies above the lowest graduation.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("step_m__gt", 0)),
                                name="network_staffplate_step",
                                violation_error_message="The step of the graduation is above zero.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("removed_at__isnull", True),
                                    ("removed_at__gt", models.F("installed_at")),
                                    _connector="OR",
                                ),
                                name="network_staffplate_removed_after_installed",
                                violation_error_message="A plate is removed after it was installed.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Person",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("password", models.CharField(max_length=128, verbose_name="password")),
                        (
                            "last_login",
                            models.DateTimeField(blank=True, null=True, verbose_name="last login"),
                        ),
                        (
                            "is_superuser",
                            models.BooleanField(
                                default=False,
                                help_text="Designates that this user has all permissions without explicitly assigning them.",
                                verbose_name="superuser status",
                            ),
                        ),
                        (
                            "username",
                            models.CharField(
                                error_messages={
                                    "unique": "A user with that username already exists."
                                },
                                help_text="Required. 150 characters or fewer. Letters, digits and @/./+/-/_ only.",
                                max_length=150,
                                unique=True,
                                validators=[
                                    django.contrib.auth.validators.UnicodeUsernameValidator()
                                ],
                                verbose_name="username",
                            ),
                        ),
                        (
                            "first_name",
                            models.CharField(blank=True, max_length=150, verbose_name="first name"),
                        ),
                        (
                            "last_name",
                            models.CharField(blank=True, max_length=150, verbose_name="last name"),
                        ),
                        (
                            "email",
                            models.EmailField(
                                blank=True, max_length=254, verbose_name="email address"
                            ),
                        ),
                        (
                            "is_staff",
                            models.BooleanField(
                                default=False,
                                help_text="Designates whether the user can log into this admin site.",
                                verbose_name="staff status",
                            ),
                        ),
                        (
                            "is_active",
                            models.BooleanField(
                                default=True,
                                help_text="Designates whether this user should be treated as active. Unselect this instead of deleting accounts.",
                                verbose_name="active",
                            ),
                        ),
                        (
                            "date_joined",
                            models.DateTimeField(
                                default=django.utils.timezone.now, verbose_name="date joined"
                            ),
                        ),
                        (
                            "phone",
                            models.CharField(blank=True, max_length=40, verbose_name="telephone"),
                        ),
                        (
                            "groups",
                            models.ManyToManyField(
                                blank=True,
                                help_text="The groups this user belongs to. A user will get all permissions granted to each of their groups.",
                                related_name="user_set",
                                related_query_name="user",
                                to="auth.group",
                                verbose_name="groups",
                            ),
                        ),
                        (
                            "user_permissions",
                            models.ManyToManyField(
                                blank=True,
                                help_text="Specific permissions for this user.",
                                related_name="user_set",
                                related_query_name="user",
                                to="auth.permission",
                                verbose_name="user permissions",
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "person",
                        "verbose_name_plural": "people",
                        "ordering": ["last_name", "first_name", "username"],
                    },
                    managers=[
                        ("objects", django.contrib.auth.models.UserManager()),
                    ],
                ),
                migrations.CreateModel(
                    name="Act",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("verb", models.CharField(max_length=80, verbose_name="act")),
                        ("done_at", models.DateTimeField(verbose_name="at")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "done_by",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="acts",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "act",
                        "verbose_name_plural": "acts",
                        "ordering": ["-done_at", "-pk"],
                        "indexes": [
                            models.Index(
                                fields=["station", "-done_at"], name="network_act_by_station"
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Agency",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("name", models.CharField(max_length=200, verbose_name="name")),
                        ("address", models.TextField(blank=True, verbose_name="address")),
                        (
                            "licence_line",
                            models.CharField(
                                blank=True,
                                max_length=300,
                                verbose_name="licence of the published data",
                            ),
                        ),
                        (
                            "logo",
                            models.FileField(
                                blank=True, upload_to="agency/", verbose_name="logo (SVG or PNG)"
                            ),
                        ),
                        (
                            "record_utc_offset_minutes",
                            models.SmallIntegerField(
                                default=0,
                                help_text="A fixed offset, no daylight saving; it cannot change once readings exist.",
                                verbose_name="record clock, minutes ahead of UTC",
                            ),
                        ),
                        (
                            "civil_zone",
                            models.CharField(
                                default="UTC",
                                help_text="The zone people's watches show, for example Europe/Vienna.",
                                max_length=64,
                                verbose_name="zone of the watches",
                            ),
                        ),
                        (
                            "day_starts_at_hour",
                            models.PositiveSmallIntegerField(
                                default=0,
                                validators=[django.core.validators.MaxValueValidator(23)],
                                verbose_name="hour at which a day starts",
                            ),
                        ),
                        (
                            "water_year_start_month",
                            models.PositiveSmallIntegerField(
                                default=1,
                                validators=[
                                    django.core.validators.MinValueValidator(1),
                                    django.core.validators.MaxValueValidator(12),
                                ],
                                verbose_name="first month of the water year",
                            ),
                        ),
                        (
                            "water_year_named_by_end",
                            models.BooleanField(
                                default=True,
                                verbose_name="the water year is named after the year in which it ends",
                            ),
                        ),
                        (
                            "significant_figures",
                            models.PositiveSmallIntegerField(
                                default=3, verbose_name="significant figures"
                            ),
                        ),
                        (
                            "max_decimals",
                            models.PositiveSmallIntegerField(
                                default=3, verbose_name="most decimals"
                            ),
                        ),
                        (
                            "decimal_sign",
                            models.CharField(
                                choices=[(".", "point"), (",", "comma")],
                                default=".",
                                max_length=1,
                                verbose_name="decimal sign",
                            ),
                        ),
                        (
                            "language",
                            models.CharField(
                                default="en", max_length=10, verbose_name="language of print"
                            ),
                        ),
                        (
                            "day_coverage_percent",
                            models.PositiveSmallIntegerField(
                                default=80,
                                validators=[
                                    django.core.validators.MinValueValidator(1),
                                    django.core.validators.MaxValueValidator(100),
                                ],
                                verbose_name="part of a day that must be recorded, %",
                            ),
                        ),
                        (
                            "months_need_every_day",
                            models.BooleanField(
                                default=True,
                                verbose_name="monthly and annual means only when every day is there",
                            ),
                        ),
                        (
                            "result_method",
                            models.CharField(
                                choices=[("mid", "mid-section"), ("mean", "mean-section")],
                                default="mid",
                                max_length=4,
                                verbose_name="method that gives the discharge of a gauging",
                            ),
                        ),
                        (
                            "approver_differs",
                            models.BooleanField(
                                default=True,
                                verbose_name="a rating is approved by someone else than its author",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "agency",
                        "verbose_name_plural": "agency",
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("pk", 1)),
                                name="network_agency_only_one",
                                violation_error_message="An installation has one agency.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("record_utc_offset_minutes__range", (-720, 840))
                                ),
                                name="network_agency_clock_in_range",
                                violation_error_message="The record clock lies between UTC−12 and UTC+14.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("water_year_start_month__range", (1, 12))),
                                name="network_agency_start_month",
                                violation_error_message="The water year starts in a month from 1 to 12.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("day_starts_at_hour__range", (0, 23))),
                                name="network_agency_day_start",
                                violation_error_message="A day starts at an hour from 0 to 23.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="MeterGroup",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("name", models.CharField(max_length=80, verbose_name="name")),
                    ],
                    options={
                        "verbose_name": "group of meters",
                        "verbose_name_plural": "groups of meters",
                        "ordering": ["name"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("name",),
                                name="network_metergroup_name_once",
                                violation_error_message="There is already a group of this name.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="MeterPair",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "is_cup_meter",
                            models.BooleanField(
                                default=False, verbose_name="cup meter (vertical axis)"
                            ),
                        ),
                        (
                            "body",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="pairs_as_body",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "group",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="pairs",
                                to="network.metergroup",
                                verbose_name="group rating",
                            ),
                        ),
                        (
                            "rotor",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="pairs_as_rotor",
                                to="network.instrument",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "current meter",
                        "verbose_name_plural": "current meters",
                        "ordering": ["body__serial", "rotor__serial"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("body", "rotor"),
                                name="network_meterpair_once",
                                violation_error_message="This body and rotor are already a pair.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("body", models.F("rotor")), _negated=True),
                                name="network_meterpair_two_parts",
                                violation_error_message="Body and rotor are two instruments.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Calibration",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "laboratory",
                            models.CharField(blank=True, max_length=120, verbose_name="laboratory"),
                        ),
                        (
                            "certificate_number",
                            models.CharField(
                                blank=True, max_length=60, verbose_name="certificate number"
                            ),
                        ),
                        (
                            "certificate",
                            models.FileField(
                                blank=True, upload_to="certificates/", verbose_name="certificate"
                            ),
                        ),
                        (
                            "source",
                            models.CharField(
                                choices=[
                                    ("runs", "fitted here to tow runs"),
                                    ("certificate", "typed from the certificate"),
                                ],
                                default="certificate",
                                max_length=12,
                                verbose_name="source",
                            ),
                        ),
                        (
                            "lowest_velocity_ms",
                            models.FloatField(
                                blank=True, null=True, verbose_name="valid from, m/s"
                            ),
                        ),
                        (
                            "highest_velocity_ms",
                            models.FloatField(blank=True, null=True, verbose_name="valid to, m/s"),
                        ),
                        (
                            "standard_error_ms",
                            models.FloatField(
                                blank=True, null=True, verbose_name="standard error, m/s"
                            ),
                        ),
                        (
                            "uncertainty_percent",
                            models.FloatField(
                                blank=True, null=True, verbose_name="standard uncertainty stated, %"
                            ),
                        ),
                        (
                            "outcome",
                            models.CharField(
                                choices=[
                                    ("passed", "passed"),
                                    ("adjusted", "adjusted and passed"),
                                    ("failed", "failed"),
                                ],
                                default="passed",
                                max_length=10,
                                verbose_name="outcome",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="calibrations",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "group",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="calibrations",
                                to="network.metergroup",
                            ),
                        ),
                        (
                            "pair",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="calibrations",
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "calibration",
                        "verbose_name_plural": "calibrations",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_calibration_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("group__isnull", True),
                                        ("instrument__isnull", True),
                                        ("pair__isnull", False),
                                    ),
                                    models.Q(
                                        ("group__isnull", False),
                                        ("instrument__isnull", True),
                                        ("pair__isnull", True),
                                    ),
                                    models.Q(
                                        ("group__isnull", True),
                                        ("instrument__isnull", False),
                                        ("pair__isnull", True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_calibration_one_owner",
                                violation_error_message="A calibration belongs to a meter, a group of meters or an instrument.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("pair", "group", "instrument", "effective_from"),
                                name="network_calibration_start_once",
                                nulls_distinct=False,
                                violation_error_message="There is already a calibration from this instant.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Curve",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("number", models.CharField(max_length=20, verbose_name="rating version")),
                        (
                            "form",
                            models.CharField(
                                choices=[
                                    ("segments", "segments Q = C·(h − h₀)^b"),
                                    ("log", "table, linear in ln Q against ln(h − h₀)"),
                                    ("linear", "table, linear"),
                                ],
                                default="segments",
                                max_length=10,
                                verbose_name="form",
                            ),
                        ),
                        (
                            "h0_m",
                            models.FloatField(
                                blank=True,
                                help_text="Stage of zero flow.",
                                null=True,
                                verbose_name="h₀ of the table, m",
                            ),
                        ),
                        ("lowest_use_m", models.FloatField(verbose_name="used from stage, m")),
                        ("highest_use_m", models.FloatField(verbose_name="used up to stage, m")),
                        (
                            "extrapolate_low_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="extrapolated down to, m"
                            ),
                        ),
                        (
                            "extrapolate_high_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="extrapolated up to, m"
                            ),
                        ),
                        (
                            "gauged_lowest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="lowest gauging, m"
                            ),
                        ),
                        (
                            "gauged_highest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="highest gauging, m"
                            ),
                        ),
                        (
                            "scatter_percent",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="standard error of the gaugings about the curve, %",
                            ),
                        ),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("approved", "approved")],
                                default="draft",
                                editable=False,
                                max_length=10,
                            ),
                        ),
                        (
                            "approved_at",
                            models.DateTimeField(blank=True, editable=False, null=True),
                        ),
                        (
                            "approved_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="curves",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "rating version",
                        "verbose_name_plural": "rating versions",
                        "ordering": ["station", "number"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_curve_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                fields=("station", "number"),
                                name="network_curve_number_once",
                                violation_error_message="This station already has a rating version so named.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("highest_use_m__gt", models.F("lowest_use_m"))),
                                name="network_curve_range_of_use",
                                violation_error_message="The range of use ends above its start.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("extrapolate_low_m__isnull", True),
                                        ("extrapolate_low_m__lt", models.F("lowest_use_m")),
                                        _connector="OR",
                                    ),
                                    models.Q(
                                        ("extrapolate_high_m__isnull", True),
                                        ("extrapolate_high_m__gt", models.F("highest_use_m")),
                                        _connector="OR",
                                    ),
                                ),
                                name="network_curve_extrapolation_outside",
                                violation_error_message="Extrapolation lies outside the range of use.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("approved_at__isnull", False),
                                        ("approved_by__isnull", False),
                                        ("state", "approved"),
                                    ),
                                    models.Q(
                                        ("approved_at__isnull", True),
                                        ("approved_by__isnull", True),
                                        ("state", "draft"),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_curve_approval_whole",
                                violation_error_message="An approved version says by whom and when.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Deployment",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="deployments",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="deployments",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "deployment",
                        "verbose_name_plural": "deployments",
                        "ordering": ["installed_at"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("series", "installed_at"),
                                name="network_deployment_start_once",
                                violation_error_message="This series already has a recorder from that instant.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("removed_at__isnull", True)),
                                fields=("instrument",),
                                name="network_deployment_instrument_in_one_place",
                                violation_error_message="This instrument still stands at another series.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("removed_at__isnull", True),
                                    ("removed_at__gt", models.F("installed_at")),
                                    _connector="OR",
                                ),
                                name="network_deployment_removed_after_installed",
                                violation_error_message="A recorder is removed after it was installed.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Visit",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(default=uuid.uuid4, editable=False, unique=True),
                        ),
                        ("arrived_at", models.DateTimeField(verbose_name="arrived")),
                        (
                            "departed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="departed"),
                        ),
                        ("is_routine", models.BooleanField(default=True, verbose_name="routine")),
                        (
                            "is_for_gauging",
                            models.BooleanField(default=False, verbose_name="gauging"),
                        ),
                        (
                            "is_for_levels",
                            models.BooleanField(default=False, verbose_name="level check"),
                        ),
                        (
                            "is_for_repair",
                            models.BooleanField(default=False, verbose_name="repair"),
                        ),
                        ("is_for_flood", models.BooleanField(default=False, verbose_name="flood")),
                        (
                            "weather",
                            models.CharField(blank=True, max_length=120, verbose_name="weather"),
                        ),
                        (
                            "river",
                            models.CharField(blank=True, max_length=120, verbose_name="river"),
                        ),
                        (
                            "control_condition",
                            models.CharField(
                                choices=[
                                    ("clear", "clear"),
                                    ("weed", "weed"),
                                    ("debris", "debris"),
                                    ("ice", "ice"),
                                    ("scoured", "scoured"),
                                    ("silted", "silted"),
                                    ("backwater", "backwater"),
                                ],
                                default="clear",
                                max_length=10,
                                verbose_name="control",
                            ),
                        ),
                        ("work_done", models.TextField(blank=True, verbose_name="work done")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("checked", "checked")],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "instruments",
                            models.ManyToManyField(
                                blank=True,
                                related_name="visits",
                                to="network.instrument",
                                verbose_name="instruments used",
                            ),
                        ),
                        (
                            "party",
                            models.ManyToManyField(
                                blank=True,
                                related_name="visits",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="party",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="visits",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "visit",
                        "verbose_name_plural": "visits",
                        "ordering": ["-arrived_at"],
                        "indexes": [
                            models.Index(
                                fields=["station", "-arrived_at"], name="network_visit_latest"
                            )
                        ],
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("departed_at__isnull", True),
                                    ("departed_at__gte", models.F("arrived_at")),
                                    _connector="OR",
                                ),
                                name="network_visit_departed_after_arrived",
                                violation_error_message="The party departs after it arrived.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Gauging",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(default=uuid.uuid4, editable=False, unique=True),
                        ),
                        ("started_at", models.DateTimeField(verbose_name="started")),
                        ("ended_at", models.DateTimeField(verbose_name="ended")),
                        (
                            "way",
                            models.CharField(
                                choices=[
                                    ("wading", "wading"),
                                    ("bridge", "bridge"),
                                    ("cableway", "cableway"),
                                    ("boat", "boat"),
                                    ("ice", "ice"),
                                    ("bank", "from the bank"),
                                ],
                                default="wading",
                                max_length=10,
                                verbose_name="how",
                            ),
                        ),
                        (
                            "method",
                            models.CharField(
                                choices=[
                                    ("meter", "velocity-area with a current meter"),
                                    ("acoustic", "moving-boat acoustic"),
                                    ("float", "floats"),
                                    ("dilution", "dilution"),
                                    ("volume", "volumetric"),
                                    ("weir", "weir"),
                                ],
                                default="meter",
                                max_length=10,
                                verbose_name="method",
                            ),
                        ),
                        (
                            "sounding",
                            models.CharField(
                                choices=[
                                    ("rod", "rod"),
                                    ("line", "weight on a line"),
                                    ("acoustic", "echo sounder"),
                                ],
                                default="rod",
                                max_length=10,
                                verbose_name="sounding",
                            ),
                        ),
                        (
                            "spin_test_seconds",
                            models.FloatField(blank=True, null=True, verbose_name="spin test, s"),
                        ),
                        (
                            "stage_start_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage at the start, m"
                            ),
                        ),
                        (
                            "stage_end_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage at the end, m"
                            ),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "stated_discharge_m3s",
                            models.FloatField(
                                blank=True, null=True, verbose_name="discharge stated, m³/s"
                            ),
                        ),
                        (
                            "stated_u95_percent",
                            models.FloatField(blank=True, null=True, verbose_name="U₉₅ stated, %"),
                        ),
                        (
                            "state",
                            models.CharField(
                                choices=[
                                    ("draft", "draft"),
                                    ("signed", "signed"),
                                    ("checked", "checked"),
                                ],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("signed_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "discharge_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="discharge, m³/s"
                            ),
                        ),
                        (
                            "mid_section_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mid-section, m³/s"
                            ),
                        ),
                        (
                            "mean_section_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean-section, m³/s"
                            ),
                        ),
                        (
                            "area_m2",
                            models.FloatField(editable=False, null=True, verbose_name="area, m²"),
                        ),
                        (
                            "width_m",
                            models.FloatField(editable=False, null=True, verbose_name="width, m"),
                        ),
                        (
                            "mean_velocity_ms",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean velocity, m/s"
                            ),
                        ),
                        (
                            "greatest_depth_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="greatest depth, m"
                            ),
                        ),
                        (
                            "hydraulic_radius_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="hydraulic radius, m"
                            ),
                        ),
                        (
                            "froude",
                            models.FloatField(
                                editable=False, null=True, verbose_name="Froude number"
                            ),
                        ),
                        (
                            "u95_percent",
                            models.FloatField(editable=False, null=True, verbose_name="U₉₅, %"),
                        ),
                        (
                            "signed_stage_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean stage at signing, m"
                            ),
                        ),
                        ("signed_deviation_percent", models.FloatField(editable=False, null=True)),
                        ("signed_shift_m", models.FloatField(editable=False, null=True)),
                        (
                            "calibration",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="gaugings",
                                to="network.calibration",
                            ),
                        ),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "party",
                            models.ManyToManyField(
                                blank=True, related_name="gaugings", to=settings.AUTH_USER_MODEL
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "signed_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="gaugings",
                                to="network.instrument",
                                verbose_name="other instrument",
                            ),
                        ),
                        (
                            "pair",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="gaugings",
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="gaugings",
                                to="network.station",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="gaugings",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "gauging",
                        "verbose_name_plural": "gaugings",
                        "ordering": ["-started_at"],
                        "indexes": [
                            models.Index(
                                fields=["station", "-started_at"], name="network_gauging_latest"
                            )
                        ],
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("ended_at__gte", models.F("started_at"))),
                                name="network_gauging_ends_after_start",
                                violation_error_message="A gauging ends after it started.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("signed_at__isnull", True),
                                        ("signed_by__isnull", True),
                                        ("state", "draft"),
                                    ),
                                    models.Q(
                                        ("discharge_m3s__isnull", False),
                                        ("signed_at__isnull", False),
                                        ("signed_by__isnull", False),
                                        ("state__in", ["signed", "checked"]),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_gauging_signed_has_result",
                                violation_error_message="A signed gauging has a discharge and a signature.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("checked_at__isnull", False),
                                        ("checked_by__isnull", False),
                                        ("state", "checked"),
                                    ),
                                    models.Q(
                                        models.Q(("state", "checked"), _negated=True),
                                        ("checked_at__isnull", True),
                                        ("checked_by__isnull", True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_gauging_check_whole",
                                violation_error_message="A checked gauging says by whom and when.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Channel",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "starting_bank",
                            models.CharField(
                                choices=[("left", "left bank"), ("right", "right bank")],
                                default="left",
                                max_length=5,
                                verbose_name="starting bank",
                            ),
                        ),
                        ("start_distance_m", models.FloatField(verbose_name="first edge at, m")),
                        (
                            "start_depth_m",
                            models.FloatField(default=0, verbose_name="depth at the first edge, m"),
                        ),
                        (
                            "start_edge",
                            models.CharField(
                                choices=[
                                    ("sloping", "sloping bank"),
                                    ("steep", "steep or rough bank"),
                                    ("wall", "smooth wall"),
                                    ("dead", "dead water"),
                                ],
                                default="sloping",
                                max_length=8,
                                verbose_name="first edge",
                            ),
                        ),
                        (
                            "start_velocity_ms",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="velocity measured at the first edge, m/s",
                            ),
                        ),
                        ("end_distance_m", models.FloatField(verbose_name="last edge at, m")),
                        (
                            "end_depth_m",
                            models.FloatField(default=0, verbose_name="depth at the last edge, m"),
                        ),
                        (
                            "end_edge",
                            models.CharField(
                                choices=[
                                    ("sloping", "sloping bank"),
                                    ("steep", "steep or rough bank"),
                                    ("wall", "smooth wall"),
                                    ("dead", "dead water"),
                                ],
                                default="sloping",
                                max_length=8,
                                verbose_name="last edge",
                            ),
                        ),
                        (
                            "end_velocity_ms",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="velocity measured at the last edge, m/s",
                            ),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="channels",
                                to="network.gauging",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "channel",
                        "verbose_name_plural": "channels",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("gauging", "position"),
                                name="network_channel_position_once",
                                violation_error_message="Two channels stand at the same place.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="GaugingFinding",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("kind", models.CharField(max_length=40)),
                        (
                            "place",
                            models.CharField(blank=True, max_length=60, verbose_name="where"),
                        ),
                        ("sentence", models.CharField(max_length=300, verbose_name="finding")),
                        (
                            "source",
                            models.CharField(blank=True, max_length=120, verbose_name="source"),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="findings",
                                to="network.gauging",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "finding",
                        "verbose_name_plural": "findings",
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalAgency",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("name", models.CharField(max_length=200, verbose_name="name")),
                        ("address", models.TextField(blank=True, verbose_name="address")),
                        (
                            "licence_line",
                            models.CharField(
                                blank=True,
                                max_length=300,
                                verbose_name="licence of the published data",
                            ),
                        ),
                        (
                            "logo",
                            models.TextField(
                                blank=True, max_length=100, verbose_name="logo (SVG or PNG)"
                            ),
                        ),
                        (
                            "record_utc_offset_minutes",
                            models.SmallIntegerField(
                                default=0,
                                help_text="A fixed offset, no daylight saving; it cannot change once readings exist.",
                                verbose_name="record clock, minutes ahead of UTC",
                            ),
                        ),
                        (
                            "civil_zone",
                            models.CharField(
                                default="UTC",
                                help_text="The zone people's watches show, for example Europe/Vienna.",
                                max_length=64,
                                verbose_name="zone of the watches",
                            ),
                        ),
                        (
                            "day_starts_at_hour",
                            models.PositiveSmallIntegerField(
                                default=0,
                                validators=[django.core.validators.MaxValueValidator(23)],
                                verbose_name="hour at which a day starts",
                            ),
                        ),
                        (
                            "water_year_start_month",
                            models.PositiveSmallIntegerField(
                                default=1,
                                validators=[
                                    django.core.validators.MinValueValidator(1),
                                    django.core.validators.MaxValueValidator(12),
                                ],
                                verbose_name="first month of the water year",
                            ),
                        ),
                        (
                            "water_year_named_by_end",
                            models.BooleanField(
                                default=True,
                                verbose_name="the water year is named after the year in which it ends",
                            ),
                        ),
                        (
                            "significant_figures",
                            models.PositiveSmallIntegerField(
                                default=3, verbose_name="significant figures"
                            ),
                        ),
                        (
                            "max_decimals",
                            models.PositiveSmallIntegerField(
                                default=3, verbose_name="most decimals"
                            ),
                        ),
                        (
                            "decimal_sign",
                            models.CharField(
                                choices=[(".", "point"), (",", "comma")],
                                default=".",
                                max_length=1,
                                verbose_name="decimal sign",
                            ),
                        ),
                        (
                            "language",
                            models.CharField(
                                default="en", max_length=10, verbose_name="language of print"
                            ),
                        ),
                        (
                            "day_coverage_percent",
                            models.PositiveSmallIntegerField(
                                default=80,
                                validators=[
                                    django.core.validators.MinValueValidator(1),
                                    django.core.validators.MaxValueValidator(100),
                                ],
                                verbose_name="part of a day that must be recorded, %",
                            ),
                        ),
                        (
                            "months_need_every_day",
                            models.BooleanField(
                                default=True,
                                verbose_name="monthly and annual means only when every day is there",
                            ),
                        ),
                        (
                            "result_method",
                            models.CharField(
                                choices=[("mid", "mid-section"), ("mean", "mean-section")],
                                default="mid",
                                max_length=4,
                                verbose_name="method that gives the discharge of a gauging",
                            ),
                        ),
                        (
                            "approver_differs",
                            models.BooleanField(
                                default=True,
                                verbose_name="a rating is approved by someone else than its author",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical agency",
                        "verbose_name_plural": "historical agency",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalBenchmarkElevation",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "elevation_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="elevation above the datum, m"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "benchmark",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.benchmark",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical benchmark elevation",
                        "verbose_name_plural": "historical benchmark elevations",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalChannel",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "starting_bank",
                            models.CharField(
                                choices=[("left", "left bank"), ("right", "right bank")],
                                default="left",
                                max_length=5,
                                verbose_name="starting bank",
                            ),
                        ),
                        ("start_distance_m", models.FloatField(verbose_name="first edge at, m")),
                        (
                            "start_depth_m",
                            models.FloatField(default=0, verbose_name="depth at the first edge, m"),
                        ),
                        (
                            "start_edge",
                            models.CharField(
                                choices=[
                                    ("sloping", "sloping bank"),
                                    ("steep", "steep or rough bank"),
                                    ("wall", "smooth wall"),
                                    ("dead", "dead water"),
                                ],
                                default="sloping",
                                max_length=8,
                                verbose_name="first edge",
                            ),
                        ),
                        (
                            "start_velocity_ms",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="velocity measured at the first edge, m/s",
                            ),
                        ),
                        ("end_distance_m", models.FloatField(verbose_name="last edge at, m")),
                        (
                            "end_depth_m",
                            models.FloatField(default=0, verbose_name="depth at the last edge, m"),
                        ),
                        (
                            "end_edge",
                            models.CharField(
                                choices=[
                                    ("sloping", "sloping bank"),
                                    ("steep", "steep or rough bank"),
                                    ("wall", "smooth wall"),
                                    ("dead", "dead water"),
                                ],
                                default="sloping",
                                max_length=8,
                                verbose_name="last edge",
                            ),
                        ),
                        (
                            "end_velocity_ms",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="velocity measured at the last edge, m/s",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.gauging",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical channel",
                        "verbose_name_plural": "historical channels",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCurveGauging",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("is_used", models.BooleanField(default=True, verbose_name="used")),
                        (
                            "left_out_because",
                            models.CharField(
                                blank=True, max_length=200, verbose_name="left out because"
                            ),
                        ),
                        (
                            "deviation_percent",
                            models.FloatField(blank=True, null=True, verbose_name="deviation, %"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.curve",
                            ),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.gauging",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical gauging of a rating",
                        "verbose_name_plural": "historical gaugings of a rating",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCurvePoint",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("stage_m", models.FloatField(verbose_name="stage, m")),
                        ("flow_m3s", models.FloatField(verbose_name="flow, m³/s")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.curve",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical point of the table",
                        "verbose_name_plural": "historical points of the table",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCurveSegment",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("lower_stage_m", models.FloatField(verbose_name="from stage, m")),
                        ("c", models.FloatField(verbose_name="C")),
                        ("h0_m", models.FloatField(verbose_name="h₀, m")),
                        ("b", models.FloatField(verbose_name="b")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.curve",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical segment",
                        "verbose_name_plural": "historical segments",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalKindInterval",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("float", "float recorder in a stilling well"),
                                    ("bubbler", "gas bubbler"),
                                    ("pressure", "pressure recorder"),
                                    ("radar", "radar recorder"),
                                    ("body", "current meter body"),
                                    ("rotor", "current meter rotor"),
                                    ("acoustic", "acoustic profiler"),
                                    ("em", "electromagnetic meter"),
                                    ("level", "level"),
                                    ("staff", "levelling staff"),
                                    ("salt", "conductivity meter"),
                                    ("winch", "winch and weight"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="months"
                            ),
                        ),
                        (
                            "hours",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="hours of use"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical interval of a kind of instrument",
                        "verbose_name_plural": "historical intervals of kinds of instruments",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalMappingProfile",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("name", models.CharField(max_length=80, verbose_name="name")),
                        (
                            "time_column",
                            models.CharField(
                                default="1",
                                help_text="Name or number.",
                                max_length=80,
                                verbose_name="column of time or date",
                            ),
                        ),
                        (
                            "clock_column",
                            models.CharField(
                                blank=True,
                                max_length=80,
                                verbose_name="column of the time of day, if apart",
                            ),
                        ),
                        (
                            "value_column",
                            models.CharField(
                                default="2", max_length=80, verbose_name="column of the value"
                            ),
                        ),
                        (
                            "time_format",
                            models.CharField(
                                default="ISO",
                                help_text="ISO, or signs such as %d.%m.%Y %H:%M",
                                max_length=60,
                                verbose_name="form of the time",
                            ),
                        ),
                        (
                            "delimiter",
                            models.CharField(
                                choices=[
                                    ("auto", "found by itself"),
                                    (",", "comma"),
                                    (";", "semicolon"),
                                    ("tab", "tab"),
                                    ("space", "blanks"),
                                ],
                                default="auto",
                                max_length=6,
                                verbose_name="delimiter",
                            ),
                        ),
                        (
                            "header_lines",
                            models.PositiveSmallIntegerField(
                                default=0, verbose_name="lines before the column names or data"
                            ),
                        ),
                        (
                            "has_column_names",
                            models.BooleanField(
                                default=True, verbose_name="a line of column names follows"
                            ),
                        ),
                        (
                            "decimal_sign",
                            models.CharField(
                                choices=[(".", "point"), (",", "comma")],
                                default=".",
                                max_length=1,
                                verbose_name="decimal sign",
                            ),
                        ),
                        (
                            "unit",
                            models.CharField(
                                choices=[("m", "m"), ("cm", "cm"), ("mm", "mm")],
                                default="m",
                                max_length=2,
                                verbose_name="unit",
                            ),
                        ),
                        (
                            "encoding",
                            models.CharField(
                                choices=[
                                    ("auto", "found by itself"),
                                    ("utf-8", "UTF-8"),
                                    ("latin-1", "Latin-1"),
                                    ("utf-16", "UTF-16"),
                                ],
                                default="auto",
                                max_length=10,
                                verbose_name="encoding",
                            ),
                        ),
                        (
                            "clock",
                            models.CharField(
                                choices=[
                                    ("fixed", "fixed offset from UTC"),
                                    ("civil", "civil zone with daylight saving"),
                                ],
                                default="fixed",
                                max_length=5,
                                verbose_name="clock",
                            ),
                        ),
                        (
                            "utc_offset_minutes",
                            models.SmallIntegerField(
                                default=0, verbose_name="minutes ahead of UTC"
                            ),
                        ),
                        (
                            "civil_zone",
                            models.CharField(blank=True, max_length=64, verbose_name="civil zone"),
                        ),
                        (
                            "missing_texts",
                            models.CharField(
                                blank=True,
                                max_length=120,
                                verbose_name="texts that mean missing, separated by blanks",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical mapping profile",
                        "verbose_name_plural": "historical mapping profiles",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalMeterGroup",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("name", models.CharField(max_length=80, verbose_name="name")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical group of meters",
                        "verbose_name_plural": "historical groups of meters",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalOffice",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("address", models.TextField(blank=True, verbose_name="address")),
                        (
                            "latitude_deg",
                            models.FloatField(blank=True, null=True, verbose_name="latitude, °"),
                        ),
                        (
                            "longitude_deg",
                            models.FloatField(blank=True, null=True, verbose_name="longitude, °"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical office",
                        "verbose_name_plural": "historical offices",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalTransect",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "starting_bank",
                            models.CharField(
                                choices=[("left", "left bank"), ("right", "right bank")],
                                max_length=5,
                                verbose_name="starting bank",
                            ),
                        ),
                        ("discharge_m3s", models.FloatField(verbose_name="discharge, m³/s")),
                        ("seconds", models.FloatField(verbose_name="duration, s")),
                        ("is_used", models.BooleanField(default=True, verbose_name="used")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.gauging",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical transect",
                        "verbose_name_plural": "historical transects",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalVertical",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        ("distance_m", models.FloatField(verbose_name="distance, m")),
                        ("depth_m", models.FloatField(verbose_name="depth, m")),
                        (
                            "measured_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="time"),
                        ),
                        (
                            "angle_deg",
                            models.FloatField(default=0, verbose_name="angle of the flow, °"),
                        ),
                        (
                            "ice_underside_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="water surface to underside of ice, m",
                            ),
                        ),
                        (
                            "line_angle_deg",
                            models.FloatField(
                                blank=True, null=True, verbose_name="angle of the line, °"
                            ),
                        ),
                        (
                            "air_line_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="line above water, m"
                            ),
                        ),
                        (
                            "wet_line_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="line in water, m"
                            ),
                        ),
                        ("mean_velocity_ms", models.FloatField(editable=False, null=True)),
                        ("panel_flow_m3s", models.FloatField(editable=False, null=True)),
                        ("panel_share_percent", models.FloatField(editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "channel",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.channel",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical vertical",
                        "verbose_name_plural": "historical verticals",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalWorkingRules",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "level_closure_mm",
                            models.FloatField(
                                default=0.9, verbose_name="closure of levels per √set-up, mm"
                            ),
                        ),
                        (
                            "level_closure_cap_mm",
                            models.FloatField(
                                default=4.6, verbose_name="largest closure of levels, mm"
                            ),
                        ),
                        (
                            "level_tolerance_mm",
                            models.FloatField(
                                default=3, verbose_name="smallest error of a plate that counts, mm"
                            ),
                        ),
                        (
                            "peg_test_limit_mm",
                            models.FloatField(
                                default=2.5, verbose_name="collimation error, mm in 50 m"
                            ),
                        ),
                        (
                            "plates_agree_mm",
                            models.FloatField(
                                default=10, verbose_name="two plates read together agree within, mm"
                            ),
                        ),
                        (
                            "plate_overlap_m",
                            models.FloatField(
                                default=0.1, verbose_name="overlap of neighbouring plates, m"
                            ),
                        ),
                        (
                            "correction_tolerance_mm",
                            models.FloatField(
                                default=5,
                                verbose_name="smallest recorder error that is corrected, mm",
                            ),
                        ),
                        (
                            "calibration_months",
                            models.PositiveSmallIntegerField(
                                default=12, verbose_name="calibration, months"
                            ),
                        ),
                        (
                            "calibration_hours",
                            models.PositiveSmallIntegerField(
                                default=300, verbose_name="calibration, hours of use"
                            ),
                        ),
                        (
                            "calibration_change_percent",
                            models.FloatField(
                                default=2,
                                verbose_name="change between calibrations that calls for a look, %",
                            ),
                        ),
                        (
                            "visit_days",
                            models.PositiveSmallIntegerField(
                                default=42, verbose_name="routine visit, days"
                            ),
                        ),
                        (
                            "level_check_months",
                            models.PositiveSmallIntegerField(
                                default=36, verbose_name="level check, months"
                            ),
                        ),
                        (
                            "gaugings_per_year",
                            models.PositiveSmallIntegerField(
                                default=6, verbose_name="gaugings a year"
                            ),
                        ),
                        (
                            "inspection_months",
                            models.PositiveSmallIntegerField(
                                default=12, verbose_name="safety inspection, months"
                            ),
                        ),
                        (
                            "silence_days",
                            models.PositiveSmallIntegerField(
                                default=45, verbose_name="no data since, days"
                            ),
                        ),
                        (
                            "review_days",
                            models.PositiveSmallIntegerField(
                                default=90, verbose_name="record unreviewed, days"
                            ),
                        ),
                        (
                            "check_days",
                            models.PositiveSmallIntegerField(
                                default=14, verbose_name="visit or gauging unchecked, days"
                            ),
                        ),
                        (
                            "doubt_count",
                            models.PositiveSmallIntegerField(
                                default=3,
                                verbose_name="gaugings in a row on one side that put a rating in doubt",
                            ),
                        ),
                        (
                            "one_point_depth_m",
                            models.FloatField(
                                default=0.5, verbose_name="one point suffices up to a depth of, m"
                            ),
                        ),
                        (
                            "two_point_depth_m",
                            models.FloatField(
                                default=0.8, verbose_name="two points wanted from a depth of, m"
                            ),
                        ),
                        (
                            "surface_factor",
                            models.FloatField(
                                default=0.86, verbose_name="surface velocity to mean velocity"
                            ),
                        ),
                        (
                            "systematic_percent",
                            models.FloatField(
                                default=1.0, verbose_name="systematic standard uncertainty, %"
                            ),
                        ),
                        (
                            "wading_product_m2s",
                            models.FloatField(
                                default=0.9, verbose_name="wading below depth × velocity of, m²/s"
                            ),
                        ),
                        (
                            "weigh_bands_by_time",
                            models.BooleanField(
                                default=False,
                                verbose_name="gaugings wanted where water stands most of the time, not where most volume passes",
                            ),
                        ),
                        (
                            "stage_uncertainty_mm",
                            models.FloatField(
                                default=5, verbose_name="standard uncertainty of stage, mm"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical working rules",
                        "verbose_name_plural": "historical working rules",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="Job",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("kind", models.CharField(max_length=60, verbose_name="kind")),
                        (
                            "subject",
                            models.CharField(blank=True, max_length=200, verbose_name="about"),
                        ),
                        (
                            "state",
                            models.CharField(
                                choices=[
                                    ("waiting", "waiting"),
                                    ("running", "running"),
                                    ("done", "done"),
                                    ("failed", "failed"),
                                ],
                                default="waiting",
                                max_length=8,
                                verbose_name="state",
                            ),
                        ),
                        ("asked_at", models.DateTimeField(verbose_name="asked at")),
                        ("lease_until", models.DateTimeField(null=True)),
                        ("holder", models.CharField(blank=True, max_length=40)),
                        (
                            "attempts",
                            models.PositiveSmallIntegerField(default=0, verbose_name="attempts"),
                        ),
                        ("steps_done", models.PositiveIntegerField(default=0, verbose_name="done")),
                        ("steps_total", models.PositiveIntegerField(default=0, verbose_name="of")),
                        ("message", models.TextField(blank=True, verbose_name="message")),
                        (
                            "asked_by",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="jobs",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "job",
                        "verbose_name_plural": "jobs",
                        "ordering": ["-asked_at", "-pk"],
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(("state", "running"), _negated=True),
                                    ("lease_until__isnull", False),
                                    _connector="OR",
                                ),
                                name="network_job_running_has_lease",
                                violation_error_message="Running work holds a lease.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("steps_done__lte", models.F("steps_total"))),
                                name="network_job_progress",
                                violation_error_message="Progress does not pass its total.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="KindInterval",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("float", "float recorder in a stilling well"),
                                    ("bubbler", "gas bubbler"),
                                    ("pressure", "pressure recorder"),
                                    ("radar", "radar recorder"),
                                    ("body", "current meter body"),
                                    ("rotor", "current meter rotor"),
                                    ("acoustic", "acoustic profiler"),
                                    ("em", "electromagnetic meter"),
                                    ("level", "level"),
                                    ("staff", "levelling staff"),
                                    ("salt", "conductivity meter"),
                                    ("winch", "winch and weight"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="months"
                            ),
                        ),
                        (
                            "hours",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="hours of use"
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "interval of a kind of instrument",
                        "verbose_name_plural": "intervals of kinds of instruments",
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("kind",),
                                name="network_kindinterval_once",
                                violation_error_message="This kind already has an interval.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="LevelCheck",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(default=uuid.uuid4, editable=False, unique=True),
                        ),
                        ("levelled_at", models.DateTimeField(verbose_name="levelled at")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("checked", "checked")],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("adopted_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "adopted_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.instrument",
                                verbose_name="level",
                            ),
                        ),
                        (
                            "party",
                            models.ManyToManyField(
                                blank=True,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="party",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="level_checks",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "level check",
                        "verbose_name_plural": "level checks",
                        "ordering": ["-levelled_at"],
                        "indexes": [
                            models.Index(
                                fields=["station", "-levelled_at"], name="network_levels_latest"
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalPegTest",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "distance_m",
                            models.FloatField(verbose_name="distance between the pegs, m"),
                        ),
                        (
                            "middle_a_m",
                            models.FloatField(verbose_name="from the middle, staff on A, m"),
                        ),
                        (
                            "middle_b_m",
                            models.FloatField(verbose_name="from the middle, staff on B, m"),
                        ),
                        ("near_a_m", models.FloatField(verbose_name="from near A, staff on A, m")),
                        ("near_b_m", models.FloatField(verbose_name="from near A, staff on B, m")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "level_check",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.levelcheck",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical peg test",
                        "verbose_name_plural": "historical peg tests",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="MappingProfile",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("name", models.CharField(max_length=80, verbose_name="name")),
                        (
                            "time_column",
                            models.CharField(
                                default="1",
                                help_text="Name or number.",
                                max_length=80,
                                verbose_name="column of time or date",
                            ),
                        ),
                        (
                            "clock_column",
                            models.CharField(
                                blank=True,
                                max_length=80,
                                verbose_name="column of the time of day, if apart",
                            ),
                        ),
                        (
                            "value_column",
                            models.CharField(
                                default="2", max_length=80, verbose_name="column of the value"
                            ),
                        ),
                        (
                            "time_format",
                            models.CharField(
                                default="ISO",
                                help_text="ISO, or signs such as %d.%m.%Y %H:%M",
                                max_length=60,
                                verbose_name="form of the time",
                            ),
                        ),
                        (
                            "delimiter",
                            models.CharField(
                                choices=[
                                    ("auto", "found by itself"),
                                    (",", "comma"),
                                    (";", "semicolon"),
                                    ("tab", "tab"),
                                    ("space", "blanks"),
                                ],
                                default="auto",
                                max_length=6,
                                verbose_name="delimiter",
                            ),
                        ),
                        (
                            "header_lines",
                            models.PositiveSmallIntegerField(
                                default=0, verbose_name="lines before the column names or data"
                            ),
                        ),
                        (
                            "has_column_names",
                            models.BooleanField(
                                default=True, verbose_name="a line of column names follows"
                            ),
                        ),
                        (
                            "decimal_sign",
                            models.CharField(
                                choices=[(".", "point"), (",", "comma")],
                                default=".",
                                max_length=1,
                                verbose_name="decimal sign",
                            ),
                        ),
                        (
                            "unit",
                            models.CharField(
                                choices=[("m", "m"), ("cm", "cm"), ("mm", "mm")],
                                default="m",
                                max_length=2,
                                verbose_name="unit",
                            ),
                        ),
                        (
                            "encoding",
                            models.CharField(
                                choices=[
                                    ("auto", "found by itself"),
                                    ("utf-8", "UTF-8"),
                                    ("latin-1", "Latin-1"),
                                    ("utf-16", "UTF-16"),
                                ],
                                default="auto",
                                max_length=10,
                                verbose_name="encoding",
                            ),
                        ),
                        (
                            "clock",
                            models.CharField(
                                choices=[
                                    ("fixed", "fixed offset from UTC"),
                                    ("civil", "civil zone with daylight saving"),
                                ],
                                default="fixed",
                                max_length=5,
                                verbose_name="clock",
                            ),
                        ),
                        (
                            "utc_offset_minutes",
                            models.SmallIntegerField(
                                default=0, verbose_name="minutes ahead of UTC"
                            ),
                        ),
                        (
                            "civil_zone",
                            models.CharField(blank=True, max_length=64, verbose_name="civil zone"),
                        ),
                        (
                            "missing_texts",
                            models.CharField(
                                blank=True,
                                max_length=120,
                                verbose_name="texts that mean missing, separated by blanks",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "mapping profile",
                        "verbose_name_plural": "mapping profiles",
                        "ordering": ["name"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("name",),
                                name="network_mappingprofile_name_once",
                                violation_error_message="There is already a profile of this name.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(("civil_zone", ""), ("clock", "fixed")),
                                    models.Q(
                                        ("clock", "civil"),
                                        models.Q(("civil_zone", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_mappingprofile_clock_whole",
                                violation_error_message="A civil clock names its zone, a fixed one does not.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="LoggerImport",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        (
                            "file",
                            models.FileField(
                                max_length=200, upload_to="logger/", verbose_name="file"
                            ),
                        ),
                        (
                            "original_name",
                            models.CharField(max_length=255, verbose_name="name of the file"),
                        ),
                        ("sha256", models.CharField(max_length=64)),
                        ("rows_read", models.PositiveIntegerField(verbose_name="rows read")),
                        ("rows_kept", models.PositiveIntegerField(verbose_name="rows kept")),
                        (
                            "rows_faulty",
                            models.PositiveIntegerField(default=0, verbose_name="rows skipped"),
                        ),
                        ("first_at", models.DateTimeField(verbose_name="first reading")),
                        ("last_at", models.DateTimeField(verbose_name="last reading")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "profile",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="imports",
                                to="network.mappingprofile",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="imports",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "import",
                        "verbose_name_plural": "imports",
                        "ordering": ["recorded_at", "pk"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_loggerimport_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("series", "sha256"),
                                name="network_loggerimport_file_once",
                                violation_error_message="This file is already in the series.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("last_at__gte", models.F("first_at"))),
                                name="network_loggerimport_in_order",
                                violation_error_message="The last reading is not before the first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="ImportFault",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("line", models.PositiveIntegerField(verbose_name="line")),
                        ("text", models.CharField(blank=True, max_length=200, verbose_name="text")),
                        ("reason", models.CharField(max_length=200, verbose_name="reason")),
                        (
                            "logger_import",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="faults",
                                to="network.loggerimport",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "skipped row",
                        "verbose_name_plural": "skipped rows",
                        "ordering": ["line"],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalMeterPair",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "is_cup_meter",
                            models.BooleanField(
                                default=False, verbose_name="cup meter (vertical axis)"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "body",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "rotor",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "group",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.metergroup",
                                verbose_name="group rating",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical current meter",
                        "verbose_name_plural": "historical current meters",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCalibration",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "laboratory",
                            models.CharField(blank=True, max_length=120, verbose_name="laboratory"),
                        ),
                        (
                            "certificate_number",
                            models.CharField(
                                blank=True, max_length=60, verbose_name="certificate number"
                            ),
                        ),
                        (
                            "certificate",
                            models.TextField(
                                blank=True, max_length=100, verbose_name="certificate"
                            ),
                        ),
                        (
                            "source",
                            models.CharField(
                                choices=[
                                    ("runs", "fitted here to tow runs"),
                                    ("certificate", "typed from the certificate"),
                                ],
                                default="certificate",
                                max_length=12,
                                verbose_name="source",
                            ),
                        ),
                        (
                            "lowest_velocity_ms",
                            models.FloatField(
                                blank=True, null=True, verbose_name="valid from, m/s"
                            ),
                        ),
                        (
                            "highest_velocity_ms",
                            models.FloatField(blank=True, null=True, verbose_name="valid to, m/s"),
                        ),
                        (
                            "standard_error_ms",
                            models.FloatField(
                                blank=True, null=True, verbose_name="standard error, m/s"
                            ),
                        ),
                        (
                            "uncertainty_percent",
                            models.FloatField(
                                blank=True, null=True, verbose_name="standard uncertainty stated, %"
                            ),
                        ),
                        (
                            "outcome",
                            models.CharField(
                                choices=[
                                    ("passed", "passed"),
                                    ("adjusted", "adjusted and passed"),
                                    ("failed", "failed"),
                                ],
                                default="passed",
                                max_length=10,
                                verbose_name="outcome",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "group",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.metergroup",
                            ),
                        ),
                        (
                            "pair",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical calibration",
                        "verbose_name_plural": "historical calibrations",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalStation",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("code", models.CharField(max_length=20, verbose_name="code")),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("river", models.CharField(max_length=120, verbose_name="river")),
                        (
                            "basin",
                            models.CharField(blank=True, max_length=120, verbose_name="basin"),
                        ),
                        ("latitude_deg", models.FloatField(verbose_name="latitude, °")),
                        ("longitude_deg", models.FloatField(verbose_name="longitude, °")),
                        (
                            "catchment_km2",
                            models.FloatField(
                                blank=True, null=True, verbose_name="catchment area, km²"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("discharge", "stage–discharge station"),
                                    ("stage", "stage-only station"),
                                    ("weir", "weir"),
                                ],
                                default="discharge",
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "unrated_because",
                            models.CharField(
                                blank=True,
                                choices=[
                                    ("backwater", "variable backwater"),
                                    ("velocity", "index velocity"),
                                    ("tidal", "tide"),
                                ],
                                help_text="Such a station keeps its stage record and gaugings; it is not rated here.",
                                max_length=10,
                                verbose_name="no single rating because of",
                            ),
                        ),
                        ("control", models.TextField(blank=True, verbose_name="control")),
                        ("description", models.TextField(blank=True, verbose_name="description")),
                        ("highlights", models.TextField(blank=True, verbose_name="what stood out")),
                        ("hazards", models.TextField(blank=True, verbose_name="hazards")),
                        ("safety_notes", models.TextField(blank=True, verbose_name="safety notes")),
                        ("access_notes", models.TextField(blank=True, verbose_name="access")),
                        (
                            "visit_interval_days",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="routine visit every, days"
                            ),
                        ),
                        (
                            "level_check_interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="level check every, months"
                            ),
                        ),
                        (
                            "gaugings_wanted_per_year",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="gaugings wanted a year"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical station",
                        "verbose_name_plural": "historical stations",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalRound",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("first_day", models.DateField(verbose_name="first day")),
                        ("last_day", models.DateField(verbose_name="last day")),
                        (
                            "vehicle",
                            models.CharField(blank=True, max_length=80, verbose_name="vehicle"),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        ("done_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "done_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical round",
                        "verbose_name_plural": "historical rounds",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalPerson",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "is_superuser",
                            models.BooleanField(
                                default=False,
                                help_text="Designates that this user has all permissions without explicitly assigning them.",
                                verbose_name="superuser status",
                            ),
                        ),
                        (
                            "username",
                            models.CharField(
                                db_index=True,
                                error_messages={
                                    "unique": "A user with that username already exists."
                                },
                                help_text="Required. 150 characters or fewer. Letters, digits and @/./+/-/_ only.",
                                max_length=150,
                                validators=[
                                    django.contrib.auth.validators.UnicodeUsernameValidator()
                                ],
                                verbose_name="username",
                            ),
                        ),
                        (
                            "first_name",
                            models.CharField(blank=True, max_length=150, verbose_name="first name"),
                        ),
                        (
                            "last_name",
                            models.CharField(blank=True, max_length=150, verbose_name="last name"),
                        ),
                        (
                            "email",
                            models.EmailField(
                                blank=True, max_length=254, verbose_name="email address"
                            ),
                        ),
                        (
                            "is_staff",
                            models.BooleanField(
                                default=False,
                                help_text="Designates whether the user can log into this admin site.",
                                verbose_name="staff status",
                            ),
                        ),
                        (
                            "is_active",
                            models.BooleanField(
                                default=True,
                                help_text="Designates whether this user should be treated as active. Unselect this instead of deleting accounts.",
                                verbose_name="active",
                            ),
                        ),
                        (
                            "date_joined",
                            models.DateTimeField(
                                default=django.utils.timezone.now, verbose_name="date joined"
                            ),
                        ),
                        (
                            "phone",
                            models.CharField(blank=True, max_length=40, verbose_name="telephone"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical person",
                        "verbose_name_plural": "historical people",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalInstrument",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("float", "float recorder in a stilling well"),
                                    ("bubbler", "gas bubbler"),
                                    ("pressure", "pressure recorder"),
                                    ("radar", "radar recorder"),
                                    ("body", "current meter body"),
                                    ("rotor", "current meter rotor"),
                                    ("acoustic", "acoustic profiler"),
                                    ("em", "electromagnetic meter"),
                                    ("level", "level"),
                                    ("staff", "levelling staff"),
                                    ("salt", "conductivity meter"),
                                    ("winch", "winch and weight"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        (
                            "maker",
                            models.CharField(blank=True, max_length=80, verbose_name="maker"),
                        ),
                        (
                            "model",
                            models.CharField(blank=True, max_length=80, verbose_name="model"),
                        ),
                        ("serial", models.CharField(max_length=60, verbose_name="serial number")),
                        (
                            "status",
                            models.CharField(
                                choices=[
                                    ("service", "in service"),
                                    ("calibration", "in for calibration"),
                                    ("spare", "spare"),
                                    ("withdrawn", "withdrawn"),
                                ],
                                default="service",
                                max_length=12,
                                verbose_name="status",
                            ),
                        ),
                        (
                            "interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="calibrate every, months"
                            ),
                        ),
                        (
                            "interval_hours",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="calibrate every, hours of use"
                            ),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical instrument",
                        "verbose_name_plural": "historical instruments",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalFeedLink",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        (
                            "secret_sha256",
                            models.CharField(db_index=True, editable=False, max_length=64),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "person",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical calendar link",
                        "verbose_name_plural": "historical calendar links",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="FeedLink",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        (
                            "secret_sha256",
                            models.CharField(editable=False, max_length=64, unique=True),
                        ),
                        (
                            "person",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="feeds",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="feeds",
                                to="network.office",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "calendar link",
                        "verbose_name_plural": "calendar links",
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_feedlink_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalOtherGaugeZero",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "zero_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="zero above the station zero, m"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "gauge",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.othergauge",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical zero of another gauge",
                        "verbose_name_plural": "historical zeros of other gauges",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="OtherGaugeZero",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "zero_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="zero above the station zero, m"
                            ),
                        ),
                        (
                            "gauge",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="zeros",
                                to="network.othergauge",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "zero of another gauge",
                        "verbose_name_plural": "zeros of other gauges",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_othergaugezero_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("gauge", "effective_from"),
                                name="network_othergaugezero_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="PegTest",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "distance_m",
                            models.FloatField(verbose_name="distance between the pegs, m"),
                        ),
                        (
                            "middle_a_m",
                            models.FloatField(verbose_name="from the middle, staff on A, m"),
                        ),
                        (
                            "middle_b_m",
                            models.FloatField(verbose_name="from the middle, staff on B, m"),
                        ),
                        ("near_a_m", models.FloatField(verbose_name="from near A, staff on A, m")),
                        ("near_b_m", models.FloatField(verbose_name="from near A, staff on B, m")),
                        (
                            "level_check",
                            models.OneToOneField(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="peg_test",
                                to="network.levelcheck",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "peg test",
                        "verbose_name_plural": "peg tests",
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("distance_m__gt", 0)),
                                name="network_pegtest_distance",
                                violation_error_message="The distance between the pegs is above zero.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="RatingPeriod",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "curve",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="periods",
                                to="network.curve",
                                verbose_name="rating version",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="rating_periods",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "period of a rating",
                        "verbose_name_plural": "periods of ratings",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_ratingperiod_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("station", "effective_from"),
                                name="network_ratingperiod_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalShiftTable",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "joins",
                            models.CharField(
                                choices=[
                                    ("step", "holds until the next"),
                                    ("linear", "changes linearly in time to the next"),
                                ],
                                default="step",
                                max_length=6,
                                verbose_name="towards the next table",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "period",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.ratingperiod",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical shift table",
                        "verbose_name_plural": "historical shift tables",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="Round",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("name", models.CharField(max_length=120, verbose_name="name")),
                        ("first_day", models.DateField(verbose_name="first day")),
                        ("last_day", models.DateField(verbose_name="last day")),
                        (
                            "vehicle",
                            models.CharField(blank=True, max_length=80, verbose_name="vehicle"),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        ("done_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "done_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "meters",
                            models.ManyToManyField(
                                blank=True,
                                related_name="rounds",
                                to="network.meterpair",
                                verbose_name="current meters",
                            ),
                        ),
                        (
                            "office",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.office",
                                verbose_name="office",
                            ),
                        ),
                        (
                            "party",
                            models.ManyToManyField(
                                blank=True, related_name="rounds", to=settings.AUTH_USER_MODEL
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "round",
                        "verbose_name_plural": "rounds",
                        "ordering": ["-first_day"],
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("last_day__gte", models.F("first_day"))),
                                name="network_round_in_order",
                                violation_error_message="The last day is not before the first.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Inspection",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("inspected_on", models.DateField(verbose_name="inspected on")),
                        ("is_safe", models.BooleanField(verbose_name="safe to use")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "item",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="inspections",
                                to="network.safetyitem",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "inspection",
                        "verbose_name_plural": "inspections",
                        "ordering": ["-inspected_on"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_inspection_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalInspection",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("inspected_on", models.DateField(verbose_name="inspected on")),
                        ("is_safe", models.BooleanField(verbose_name="safe to use")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "item",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.safetyitem",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical inspection",
                        "verbose_name_plural": "historical inspections",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="SensorSetting",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "scale",
                            models.FloatField(
                                blank=True, default=1, null=True, verbose_name="scale"
                            ),
                        ),
                        ("offset_m", models.FloatField(default=0, verbose_name="offset, m")),
                        (
                            "deployment",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="settings",
                                to="network.deployment",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="settings",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "sensor setting",
                        "verbose_name_plural": "sensor settings",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_sensorsetting_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("series", "effective_from"),
                                name="network_sensorsetting_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="RecorderCheck",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("checked_at", models.DateTimeField(verbose_name="time")),
                        (
                            "found_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="recorder as found, m"
                            ),
                        ),
                        (
                            "left_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="recorder as left, m"
                            ),
                        ),
                        (
                            "staff_stage_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage by the staff, m"
                            ),
                        ),
                        (
                            "wave_m",
                            models.FloatField(blank=True, null=True, verbose_name="± wave, m"),
                        ),
                        (
                            "clock_error_s",
                            models.IntegerField(
                                blank=True,
                                help_text="Above zero: the recorder is fast.",
                                null=True,
                                verbose_name="clock error, s",
                            ),
                        ),
                        (
                            "battery_v",
                            models.FloatField(blank=True, null=True, verbose_name="battery, V"),
                        ),
                        (
                            "gas_kpa",
                            models.FloatField(
                                blank=True, null=True, verbose_name="gas pressure, kPa"
                            ),
                        ),
                        ("was_purged", models.BooleanField(default=False, verbose_name="purged")),
                        (
                            "was_downloaded",
                            models.BooleanField(default=False, verbose_name="download taken"),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="recorder_checks",
                                to="network.series",
                                verbose_name="series",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="recorder_checks",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "recorder check",
                        "verbose_name_plural": "recorder checks",
                        "ordering": ["checked_at"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("visit", "series", "checked_at"),
                                name="network_recordercheck_once",
                                violation_error_message="A series is checked once at one time.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalSensorSetting",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "scale",
                            models.FloatField(
                                blank=True, default=1, null=True, verbose_name="scale"
                            ),
                        ),
                        ("offset_m", models.FloatField(default=0, verbose_name="offset, m")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "deployment",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.deployment",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical sensor setting",
                        "verbose_name_plural": "historical sensor settings",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalDeployment",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical deployment",
                        "verbose_name_plural": "historical deployments",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCorrection",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("start_at", models.DateTimeField(verbose_name="from")),
                        ("end_at", models.DateTimeField(verbose_name="to")),
                        ("start_offset_m", models.FloatField(verbose_name="added at the start, m")),
                        ("end_offset_m", models.FloatField(verbose_name="added at the end, m")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "state",
                            models.CharField(
                                choices=[("proposed", "proposed"), ("accepted", "accepted")],
                                default="proposed",
                                editable=False,
                                max_length=10,
                            ),
                        ),
                        (
                            "accepted_at",
                            models.DateTimeField(blank=True, editable=False, null=True),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "accepted_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "recorder_check",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.recordercheck",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical correction",
                        "verbose_name_plural": "historical corrections",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="Dismissal",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("finding", models.CharField(max_length=20, verbose_name="finding")),
                        ("start_at", models.DateTimeField(verbose_name="from")),
                        ("end_at", models.DateTimeField(verbose_name="to")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="dismissals",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "dismissed finding",
                        "verbose_name_plural": "dismissed findings",
                        "ordering": ["start_at"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_dismissal_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("series", "finding", "start_at"),
                                name="network_dismissal_finding_once",
                                violation_error_message="This finding is already dismissed.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Correction",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("start_at", models.DateTimeField(verbose_name="from")),
                        ("end_at", models.DateTimeField(verbose_name="to")),
                        ("start_offset_m", models.FloatField(verbose_name="added at the start, m")),
                        ("end_offset_m", models.FloatField(verbose_name="added at the end, m")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "state",
                            models.CharField(
                                choices=[("proposed", "proposed"), ("accepted", "accepted")],
                                default="proposed",
                                editable=False,
                                max_length=10,
                            ),
                        ),
                        (
                            "accepted_at",
                            models.DateTimeField(blank=True, editable=False, null=True),
                        ),
                        (
                            "accepted_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "recorder_check",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="corrections",
                                to="network.recordercheck",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="corrections",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "correction",
                        "verbose_name_plural": "corrections",
                        "ordering": ["start_at"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_correction_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("end_at__gt", models.F("start_at"))),
                                name="network_correction_ends_after_start",
                                violation_error_message="The period ends after it starts.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("accepted_at__isnull", False),
                                        ("accepted_by__isnull", False),
                                        ("state", "accepted"),
                                    ),
                                    models.Q(
                                        ("accepted_at__isnull", True),
                                        ("accepted_by__isnull", True),
                                        ("state", "proposed"),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_correction_acceptance_whole",
                                violation_error_message="An accepted correction says by whom and when.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Block",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("month", models.DateField(verbose_name="month")),
                        ("data", models.BinaryField()),
                        ("count", models.PositiveIntegerField(verbose_name="readings")),
                        ("first_at", models.DateTimeField(verbose_name="first reading")),
                        ("last_at", models.DateTimeField(verbose_name="last reading")),
                        (
                            "series",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="blocks",
                                to="network.series",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "block of readings",
                        "verbose_name_plural": "blocks of readings",
                        "ordering": ["series", "month"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("series", "month"),
                                name="network_block_month_once",
                                violation_error_message="A series has one block a month.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("month__day", 1)),
                                name="network_block_month_starts",
                                violation_error_message="A block is named by the first day of its month.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="ShiftTable",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "joins",
                            models.CharField(
                                choices=[
                                    ("step", "holds until the next"),
                                    ("linear", "changes linearly in time to the next"),
                                ],
                                default="step",
                                max_length=6,
                                verbose_name="towards the next table",
                            ),
                        ),
                        (
                            "period",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="shift_tables",
                                to="network.ratingperiod",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "shift table",
                        "verbose_name_plural": "shift tables",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_shifttable_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("period", "effective_from"),
                                name="network_shifttable_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="ShiftPoint",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("stage_m", models.FloatField(verbose_name="stage, m")),
                        ("shift_m", models.FloatField(verbose_name="shift, m")),
                        (
                            "table",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="points",
                                to="network.shifttable",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "point of a shift table",
                        "verbose_name_plural": "points of a shift table",
                        "ordering": ["stage_m"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("table", "stage_m"),
                                name="network_shiftpoint_stage_once",
                                violation_error_message="A stage stands once in a shift table.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalShiftPoint",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("stage_m", models.FloatField(verbose_name="stage, m")),
                        ("shift_m", models.FloatField(verbose_name="shift, m")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "table",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.shifttable",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical point of a shift table",
                        "verbose_name_plural": "historical points of a shift table",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="SiteSurvey",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("surveyed_on", models.DateField(verbose_name="surveyed on")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="site_surveys",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "site survey",
                        "verbose_name_plural": "site surveys",
                        "ordering": ["-surveyed_on"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "surveyed_on"),
                                name="network_sitesurvey_day_once",
                                violation_error_message="This station already has a site survey of that day.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="SiteCriterion",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "criterion",
                            models.CharField(
                                choices=[
                                    ("straight", "straight reach"),
                                    ("stable", "stable, well-defined section"),
                                    ("channel", "one channel at all stages"),
                                    ("backwater", "free of backwater"),
                                    ("weed", "free of weed"),
                                    ("access", "accessible in every season and at flood"),
                                    ("velocity", "velocities within the meter's range"),
                                ],
                                max_length=12,
                                verbose_name="criterion",
                            ),
                        ),
                        (
                            "verdict",
                            models.CharField(
                                choices=[
                                    ("met", "met"),
                                    ("not_met", "not met"),
                                    ("not_known", "not known"),
                                ],
                                default="not_known",
                                max_length=10,
                                verbose_name="verdict",
                            ),
                        ),
                        (
                            "remark",
                            models.CharField(blank=True, max_length=300, verbose_name="remark"),
                        ),
                        (
                            "survey",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="criteria",
                                to="network.sitesurvey",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "criterion",
                        "verbose_name_plural": "criteria",
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("survey", "criterion"),
                                name="network_sitecriterion_once",
                                violation_error_message="Each criterion is judged once in a survey.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalSiteCriterion",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "criterion",
                            models.CharField(
                                choices=[
                                    ("straight", "straight reach"),
                                    ("stable", "stable, well-defined section"),
                                    ("channel", "one channel at all stages"),
                                    ("backwater", "free of backwater"),
                                    ("weed", "free of weed"),
                                    ("access", "accessible in every season and at flood"),
                                    ("velocity", "velocities within the meter's range"),
                                ],
                                max_length=12,
                                verbose_name="criterion",
                            ),
                        ),
                        (
                            "verdict",
                            models.CharField(
                                choices=[
                                    ("met", "met"),
                                    ("not_met", "not met"),
                                    ("not_known", "not known"),
                                ],
                                default="not_known",
                                max_length=10,
                                verbose_name="verdict",
                            ),
                        ),
                        (
                            "remark",
                            models.CharField(blank=True, max_length=300, verbose_name="remark"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "survey",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.sitesurvey",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical criterion",
                        "verbose_name_plural": "historical criteria",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="Sight",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "point",
                            models.CharField(
                                choices=[
                                    ("benchmark", "benchmark"),
                                    ("plate", "plate"),
                                    ("water", "water surface"),
                                    ("turning", "turning point"),
                                ],
                                max_length=10,
                                verbose_name="on",
                            ),
                        ),
                        (
                            "graduation_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="graduation of the plate that was sighted, m",
                            ),
                        ),
                        (
                            "backsight_m",
                            models.FloatField(blank=True, null=True, verbose_name="backsight, m"),
                        ),
                        (
                            "intermediate_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="intermediate sight, m"
                            ),
                        ),
                        (
                            "foresight_m",
                            models.FloatField(blank=True, null=True, verbose_name="foresight, m"),
                        ),
                        (
                            "remark",
                            models.CharField(blank=True, max_length=200, verbose_name="remark"),
                        ),
                        (
                            "benchmark",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.benchmark",
                            ),
                        ),
                        (
                            "level_check",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="sights",
                                to="network.levelcheck",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.staffplate",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "sight",
                        "verbose_name_plural": "sights",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                deferrable=django.db.models.constraints.Deferrable["DEFERRED"],
                                fields=("level_check", "position"),
                                name="network_sight_position_once",
                                violation_error_message="Two sights stand on the same line.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("benchmark__isnull", False),
                                        ("plate__isnull", True),
                                        ("point", "benchmark"),
                                    ),
                                    models.Q(
                                        ("benchmark__isnull", True),
                                        ("plate__isnull", False),
                                        ("point", "plate"),
                                    ),
                                    models.Q(
                                        ("benchmark__isnull", True),
                                        ("plate__isnull", True),
                                        ("point__in", ["water", "turning"]),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_sight_names_its_point",
                                violation_error_message="A sight names the benchmark or plate it was taken on.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="PlateZero",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "zero_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="plate zero above the station zero, m",
                            ),
                        ),
                        (
                            "level_check",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="plate_zeros",
                                to="network.levelcheck",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="zeros",
                                to="network.staffplate",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "plate zero",
                        "verbose_name_plural": "plate zeros",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_platezero_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("plate", "effective_from"),
                                name="network_platezero_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalSight",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "point",
                            models.CharField(
                                choices=[
                                    ("benchmark", "benchmark"),
                                    ("plate", "plate"),
                                    ("water", "water surface"),
                                    ("turning", "turning point"),
                                ],
                                max_length=10,
                                verbose_name="on",
                            ),
                        ),
                        (
                            "graduation_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="graduation of the plate that was sighted, m",
                            ),
                        ),
                        (
                            "backsight_m",
                            models.FloatField(blank=True, null=True, verbose_name="backsight, m"),
                        ),
                        (
                            "intermediate_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="intermediate sight, m"
                            ),
                        ),
                        (
                            "foresight_m",
                            models.FloatField(blank=True, null=True, verbose_name="foresight, m"),
                        ),
                        (
                            "remark",
                            models.CharField(blank=True, max_length=200, verbose_name="remark"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "benchmark",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.benchmark",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "level_check",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.levelcheck",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.staffplate",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical sight",
                        "verbose_name_plural": "historical sights",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalPlateZero",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "zero_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="plate zero above the station zero, m",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "level_check",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.levelcheck",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.staffplate",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical plate zero",
                        "verbose_name_plural": "historical plate zeros",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="RecordReview",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("reviewed_through", models.DateField(verbose_name="reviewed through")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="reviews",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "review of a record",
                        "verbose_name_plural": "reviews of records",
                        "ordering": ["-reviewed_through"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_recordreview_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Postponement",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("rule", models.CharField(max_length=30, verbose_name="rule")),
                        ("subject", models.CharField(max_length=60, verbose_name="subject")),
                        ("until", models.DateField(verbose_name="until")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="postponements",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "postponement",
                        "verbose_name_plural": "postponements",
                        "ordering": ["until"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_postponement_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="OperationPeriod",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("opened_on", models.DateField(verbose_name="opened")),
                        (
                            "closed_on",
                            models.DateField(blank=True, null=True, verbose_name="closed"),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="operation_periods",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "period of operation",
                        "verbose_name_plural": "periods of operation",
                        "ordering": ["opened_on"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "opened_on"),
                                name="network_operationperiod_opened_once",
                                violation_error_message="This station already has a period opened on that day.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("closed_on__isnull", True),
                                    ("closed_on__gte", models.F("opened_on")),
                                    _connector="OR",
                                ),
                                name="network_operationperiod_closed_after_opened",
                                violation_error_message="A station closes on or after the day it opened.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Note",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("start_at", models.DateTimeField(verbose_name="from")),
                        ("end_at", models.DateTimeField(verbose_name="to")),
                        (
                            "cause",
                            models.CharField(
                                choices=[
                                    ("ice", "ice"),
                                    ("backwater", "backwater"),
                                    ("weed", "weed"),
                                    ("datum", "doubt about the datum"),
                                    ("fault", "instrument fault"),
                                    ("regulation", "regulation"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="cause",
                            ),
                        ),
                        (
                            "flows",
                            models.CharField(
                                choices=[
                                    ("stand", "flows stand as rated"),
                                    ("estimated", "flows are estimated"),
                                    ("withheld", "flows are withheld"),
                                ],
                                default="stand",
                                max_length=10,
                                verbose_name="flows",
                            ),
                        ),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        ("text", models.TextField(blank=True, verbose_name="text")),
                        (
                            "is_printed",
                            models.BooleanField(
                                default=True, verbose_name="printed in the yearbook"
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="notes",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "note",
                        "verbose_name_plural": "notes",
                        "ordering": ["start_at"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_note_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("end_at__gt", models.F("start_at"))),
                                name="network_note_ends_after_start",
                                violation_error_message="The period ends after it starts.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("cause__in", ["ice", "backwater"]),
                                    ("flows", "stand"),
                                    _negated=True,
                                ),
                                name="network_note_ice_is_not_open_water",
                                violation_error_message="Under ice or backwater flows are estimated or withheld, never rated as open water.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("uncertainty_percent__isnull", True),
                                    ("uncertainty_percent__gt", 0),
                                    _connector="OR",
                                ),
                                name="network_note_uncertainty_positive",
                                violation_error_message="The uncertainty is above zero.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Infill",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("first_day", models.DateField(verbose_name="first day")),
                        ("last_day", models.DateField(verbose_name="last day")),
                        (
                            "method",
                            models.CharField(
                                choices=[
                                    ("line", "straight line"),
                                    ("series", "other series"),
                                    ("neighbour", "log-log regression on a neighbour"),
                                    ("winter", "winter ratio between gaugings"),
                                    ("recession", "recession"),
                                ],
                                max_length=10,
                                verbose_name="method",
                            ),
                        ),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.series",
                                verbose_name="other series",
                            ),
                        ),
                        (
                            "neighbour",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.station",
                                verbose_name="neighbour",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="infills",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "infill",
                        "verbose_name_plural": "infills",
                        "ordering": ["first_day"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_infill_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("last_day__gte", models.F("first_day"))),
                                name="network_infill_in_order",
                                violation_error_message="The last day is not before the first.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("method", "neighbour"),
                                        ("neighbour__isnull", False),
                                        ("series__isnull", True),
                                    ),
                                    models.Q(
                                        ("method", "series"),
                                        ("neighbour__isnull", True),
                                        ("series__isnull", False),
                                    ),
                                    models.Q(
                                        models.Q(
                                            ("method__in", ["neighbour", "series"]), _negated=True
                                        ),
                                        ("neighbour__isnull", True),
                                        ("series__isnull", True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_infill_names_its_source",
                                violation_error_message="An infill names its neighbour or its other series.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalVisit",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(db_index=True, default=uuid.uuid4, editable=False),
                        ),
                        ("arrived_at", models.DateTimeField(verbose_name="arrived")),
                        (
                            "departed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="departed"),
                        ),
                        ("is_routine", models.BooleanField(default=True, verbose_name="routine")),
                        (
                            "is_for_gauging",
                            models.BooleanField(default=False, verbose_name="gauging"),
                        ),
                        (
                            "is_for_levels",
                            models.BooleanField(default=False, verbose_name="level check"),
                        ),
                        (
                            "is_for_repair",
                            models.BooleanField(default=False, verbose_name="repair"),
                        ),
                        ("is_for_flood", models.BooleanField(default=False, verbose_name="flood")),
                        (
                            "weather",
                            models.CharField(blank=True, max_length=120, verbose_name="weather"),
                        ),
                        (
                            "river",
                            models.CharField(blank=True, max_length=120, verbose_name="river"),
                        ),
                        (
                            "control_condition",
                            models.CharField(
                                choices=[
                                    ("clear", "clear"),
                                    ("weed", "weed"),
                                    ("debris", "debris"),
                                    ("ice", "ice"),
                                    ("scoured", "scoured"),
                                    ("silted", "silted"),
                                    ("backwater", "backwater"),
                                ],
                                default="clear",
                                max_length=10,
                                verbose_name="control",
                            ),
                        ),
                        ("work_done", models.TextField(blank=True, verbose_name="work done")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("checked", "checked")],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical visit",
                        "verbose_name_plural": "historical visits",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalTypedFlow",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("day", models.DateField(verbose_name="day")),
                        ("flow_m3s", models.FloatField(verbose_name="daily mean flow, m³/s")),
                        ("method", models.CharField(max_length=120, verbose_name="method")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical typed daily flow",
                        "verbose_name_plural": "historical typed daily flows",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalStop",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "form_id",
                            models.UUIDField(db_index=True, default=uuid.uuid4, editable=False),
                        ),
                        (
                            "hours",
                            models.FloatField(default=2, verbose_name="hours at the station"),
                        ),
                        (
                            "by_cableway",
                            models.BooleanField(
                                default=False, verbose_name="gauging from the cableway"
                            ),
                        ),
                        (
                            "left_out_because",
                            models.CharField(
                                blank=True, max_length=200, verbose_name="left out because"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "round",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.round",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical stop",
                        "verbose_name_plural": "historical stops",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalStationZero",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "elevation_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="elevation above the datum, m"
                            ),
                        ),
                        (
                            "datum_name",
                            models.CharField(max_length=80, verbose_name="national datum"),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    (
                                        "redetermined",
                                        "elevation re-determined: the mark did not move",
                                    ),
                                    ("moved", "zero moved"),
                                ],
                                default="redetermined",
                                max_length=12,
                                verbose_name="what happened",
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical station zero",
                        "verbose_name_plural": "historical station zeros",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalStaffPlate",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("label", models.CharField(max_length=20, verbose_name="label")),
                        ("lowest_m", models.FloatField(verbose_name="lowest graduation, m")),
                        ("highest_m", models.FloatField(verbose_name="highest graduation, m")),
                        (
                            "step_m",
                            models.FloatField(
                                default=0.01, verbose_name="step of the graduation, m"
                            ),
                        ),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        (
                            "is_usual",
                            models.BooleanField(default=False, verbose_name="usually read"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical staff plate",
                        "verbose_name_plural": "historical staff plates",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalSiteSurvey",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("surveyed_on", models.DateField(verbose_name="surveyed on")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical site survey",
                        "verbose_name_plural": "historical site surveys",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalSeries",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("recorder", "recorder"),
                                    ("second", "second recorder"),
                                    ("observer", "observer's readings"),
                                ],
                                default="recorder",
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=60, verbose_name="label")),
                        ("is_primary", models.BooleanField(default=False, verbose_name="primary")),
                        (
                            "gap_limit_minutes",
                            models.PositiveIntegerField(
                                default=180,
                                verbose_name="longest step bridged by a straight line, minutes",
                            ),
                        ),
                        (
                            "is_event_logger",
                            models.BooleanField(
                                default=False,
                                help_text="The silence of such a logger is not a gap.",
                                verbose_name="records only changes",
                            ),
                        ),
                        (
                            "sensor_lowest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="sensor's range from, m"
                            ),
                        ),
                        (
                            "sensor_highest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="sensor's range to, m"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical series",
                        "verbose_name_plural": "historical series",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalSafetyItem",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("cableway", "cableway"),
                                    ("walkway", "walkway"),
                                    ("ladder", "ladder"),
                                    ("well", "stilling well"),
                                    ("boat", "boat"),
                                ],
                                max_length=10,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=60, verbose_name="label")),
                        (
                            "interval_months",
                            models.PositiveSmallIntegerField(
                                blank=True, null=True, verbose_name="inspect every, months"
                            ),
                        ),
                        (
                            "removed_on",
                            models.DateField(blank=True, null=True, verbose_name="removed"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical safety item",
                        "verbose_name_plural": "historical safety items",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalRatingPeriod",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.curve",
                                verbose_name="rating version",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical period of a rating",
                        "verbose_name_plural": "historical periods of ratings",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalPostponement",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("rule", models.CharField(max_length=30, verbose_name="rule")),
                        ("subject", models.CharField(max_length=60, verbose_name="subject")),
                        ("until", models.DateField(verbose_name="until")),
                        ("reason", models.TextField(verbose_name="reason")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical postponement",
                        "verbose_name_plural": "historical postponements",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalOtherGauge",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    ("wire", "wire-weight gauge"),
                                    ("dipper", "dipper"),
                                    ("crest", "crest gauge"),
                                    ("mark", "flood mark"),
                                ],
                                max_length=8,
                                verbose_name="kind",
                            ),
                        ),
                        ("label", models.CharField(max_length=40, verbose_name="label")),
                        ("installed_at", models.DateTimeField(verbose_name="installed")),
                        (
                            "removed_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="removed"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical other gauge",
                        "verbose_name_plural": "historical other gauges",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalOperationPeriod",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("opened_on", models.DateField(verbose_name="opened")),
                        (
                            "closed_on",
                            models.DateField(blank=True, null=True, verbose_name="closed"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical period of operation",
                        "verbose_name_plural": "historical periods of operation",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalNote",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("start_at", models.DateTimeField(verbose_name="from")),
                        ("end_at", models.DateTimeField(verbose_name="to")),
                        (
                            "cause",
                            models.CharField(
                                choices=[
                                    ("ice", "ice"),
                                    ("backwater", "backwater"),
                                    ("weed", "weed"),
                                    ("datum", "doubt about the datum"),
                                    ("fault", "instrument fault"),
                                    ("regulation", "regulation"),
                                    ("other", "other"),
                                ],
                                max_length=10,
                                verbose_name="cause",
                            ),
                        ),
                        (
                            "flows",
                            models.CharField(
                                choices=[
                                    ("stand", "flows stand as rated"),
                                    ("estimated", "flows are estimated"),
                                    ("withheld", "flows are withheld"),
                                ],
                                default="stand",
                                max_length=10,
                                verbose_name="flows",
                            ),
                        ),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        ("text", models.TextField(blank=True, verbose_name="text")),
                        (
                            "is_printed",
                            models.BooleanField(
                                default=True, verbose_name="printed in the yearbook"
                            ),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical note",
                        "verbose_name_plural": "historical notes",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalLevelCheck",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(db_index=True, default=uuid.uuid4, editable=False),
                        ),
                        ("levelled_at", models.DateTimeField(verbose_name="levelled at")),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("checked", "checked")],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("adopted_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "adopted_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                                verbose_name="level",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical level check",
                        "verbose_name_plural": "historical level checks",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalInfill",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("first_day", models.DateField(verbose_name="first day")),
                        ("last_day", models.DateField(verbose_name="last day")),
                        (
                            "method",
                            models.CharField(
                                choices=[
                                    ("line", "straight line"),
                                    ("series", "other series"),
                                    ("neighbour", "log-log regression on a neighbour"),
                                    ("winter", "winter ratio between gaugings"),
                                    ("recession", "recession"),
                                ],
                                max_length=10,
                                verbose_name="method",
                            ),
                        ),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.series",
                                verbose_name="other series",
                            ),
                        ),
                        (
                            "neighbour",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                                verbose_name="neighbour",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical infill",
                        "verbose_name_plural": "historical infills",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalDocument",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("title", models.CharField(max_length=200, verbose_name="title")),
                        ("file", models.TextField(max_length=100, verbose_name="file")),
                        ("dated", models.DateField(blank=True, null=True, verbose_name="date")),
                        (
                            "caption",
                            models.CharField(blank=True, max_length=300, verbose_name="caption"),
                        ),
                        (
                            "uploaded_at",
                            models.DateTimeField(editable=False, verbose_name="uploaded at"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "uploaded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical document",
                        "verbose_name_plural": "historical documents",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalCurve",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        ("number", models.CharField(max_length=20, verbose_name="rating version")),
                        (
                            "form",
                            models.CharField(
                                choices=[
                                    ("segments", "segments Q = C·(h − h₀)^b"),
                                    ("log", "table, linear in ln Q against ln(h − h₀)"),
                                    ("linear", "table, linear"),
                                ],
                                default="segments",
                                max_length=10,
                                verbose_name="form",
                            ),
                        ),
                        (
                            "h0_m",
                            models.FloatField(
                                blank=True,
                                help_text="Stage of zero flow.",
                                null=True,
                                verbose_name="h₀ of the table, m",
                            ),
                        ),
                        ("lowest_use_m", models.FloatField(verbose_name="used from stage, m")),
                        ("highest_use_m", models.FloatField(verbose_name="used up to stage, m")),
                        (
                            "extrapolate_low_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="extrapolated down to, m"
                            ),
                        ),
                        (
                            "extrapolate_high_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="extrapolated up to, m"
                            ),
                        ),
                        (
                            "gauged_lowest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="lowest gauging, m"
                            ),
                        ),
                        (
                            "gauged_highest_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="highest gauging, m"
                            ),
                        ),
                        (
                            "scatter_percent",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="standard error of the gaugings about the curve, %",
                            ),
                        ),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "state",
                            models.CharField(
                                choices=[("draft", "draft"), ("approved", "approved")],
                                default="draft",
                                editable=False,
                                max_length=10,
                            ),
                        ),
                        (
                            "approved_at",
                            models.DateTimeField(blank=True, editable=False, null=True),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "approved_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical rating version",
                        "verbose_name_plural": "historical rating versions",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalBenchmark",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("label", models.CharField(max_length=40, verbose_name="label")),
                        ("description", models.TextField(blank=True, verbose_name="description")),
                        (
                            "is_main",
                            models.BooleanField(default=False, verbose_name="levels start here"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical benchmark",
                        "verbose_name_plural": "historical benchmarks",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="Document",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("title", models.CharField(max_length=200, verbose_name="title")),
                        ("file", models.FileField(upload_to="documents/", verbose_name="file")),
                        ("dated", models.DateField(blank=True, null=True, verbose_name="date")),
                        (
                            "caption",
                            models.CharField(blank=True, max_length=300, verbose_name="caption"),
                        ),
                        (
                            "uploaded_at",
                            models.DateTimeField(editable=False, verbose_name="uploaded at"),
                        ),
                        (
                            "uploaded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="documents",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "document",
                        "verbose_name_plural": "documents",
                        "ordering": ["-dated", "title"],
                    },
                ),
                migrations.CreateModel(
                    name="StationYear",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("first_day", models.DateField()),
                        ("record_version", models.PositiveIntegerField()),
                        ("data", models.BinaryField()),
                        ("days_present", models.PositiveSmallIntegerField()),
                        ("days_in_year", models.PositiveSmallIntegerField()),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="years",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "station year",
                        "verbose_name_plural": "station years",
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("station", "first_day"),
                                name="network_stationyear_once",
                                violation_error_message="A station has one row a year.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="StationZero",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "elevation_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="elevation above the datum, m"
                            ),
                        ),
                        (
                            "datum_name",
                            models.CharField(max_length=80, verbose_name="national datum"),
                        ),
                        (
                            "kind",
                            models.CharField(
                                choices=[
                                    (
                                        "redetermined",
                                        "elevation re-determined: the mark did not move",
                                    ),
                                    ("moved", "zero moved"),
                                ],
                                default="redetermined",
                                max_length=12,
                                verbose_name="what happened",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="zeros",
                                to="network.station",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "station zero",
                        "verbose_name_plural": "station zeros",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_stationzero_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("station", "effective_from"),
                                name="network_stationzero_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Stop",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "form_id",
                            models.UUIDField(default=uuid.uuid4, editable=False, unique=True),
                        ),
                        (
                            "hours",
                            models.FloatField(default=2, verbose_name="hours at the station"),
                        ),
                        (
                            "by_cableway",
                            models.BooleanField(
                                default=False, verbose_name="gauging from the cableway"
                            ),
                        ),
                        (
                            "left_out_because",
                            models.CharField(
                                blank=True, max_length=200, verbose_name="left out because"
                            ),
                        ),
                        (
                            "round",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="stops",
                                to="network.round",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="stops",
                                to="network.station",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "stop",
                        "verbose_name_plural": "stops",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("round", "station"),
                                name="network_stop_station_once",
                                violation_error_message="A station stands once in a round.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalStopTask",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("text", models.CharField(max_length=200, verbose_name="task")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "stop",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.stop",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical task",
                        "verbose_name_plural": "historical tasks",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="StopTask",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("text", models.CharField(max_length=200, verbose_name="task")),
                        (
                            "stop",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="tasks",
                                to="network.stop",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "task",
                        "verbose_name_plural": "tasks",
                    },
                ),
                migrations.CreateModel(
                    name="TowRun",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        ("speed_ms", models.FloatField(verbose_name="carriage speed, m/s")),
                        ("revolutions", models.FloatField(verbose_name="revolutions")),
                        ("seconds", models.FloatField(verbose_name="seconds")),
                        (
                            "calibration",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="tow_runs",
                                to="network.calibration",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "tow run",
                        "verbose_name_plural": "tow runs",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("calibration", "position"),
                                name="network_towrun_position_once",
                                violation_error_message="Two tow runs stand on the same line.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("revolutions__gte", 0),
                                    ("seconds__gt", 0),
                                    ("speed_ms__gte", 0),
                                ),
                                name="network_towrun_plausible",
                                violation_error_message="A tow run has a speed and revolutions of at least zero and lasts some time.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Transect",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "starting_bank",
                            models.CharField(
                                choices=[("left", "left bank"), ("right", "right bank")],
                                max_length=5,
                                verbose_name="starting bank",
                            ),
                        ),
                        ("discharge_m3s", models.FloatField(verbose_name="discharge, m³/s")),
                        ("seconds", models.FloatField(verbose_name="duration, s")),
                        ("is_used", models.BooleanField(default=True, verbose_name="used")),
                        (
                            "gauging",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="transects",
                                to="network.gauging",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "transect",
                        "verbose_name_plural": "transects",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("gauging", "position"),
                                name="network_transect_position_once",
                                violation_error_message="Two transects stand on the same line.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("seconds__gt", 0)),
                                name="network_transect_lasts",
                                violation_error_message="A transect lasts some time.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="TypedFlow",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("day", models.DateField(verbose_name="day")),
                        ("flow_m3s", models.FloatField(verbose_name="daily mean flow, m³/s")),
                        ("method", models.CharField(max_length=120, verbose_name="method")),
                        ("reason", models.TextField(verbose_name="reason")),
                        (
                            "uncertainty_percent",
                            models.FloatField(blank=True, null=True, verbose_name="± %"),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="typed_flows",
                                to="network.station",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "typed daily flow",
                        "verbose_name_plural": "typed daily flows",
                        "ordering": ["day"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_typedflow_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("station", "day"),
                                name="network_typedflow_day_once",
                                violation_error_message="This day already has a typed flow; withdraw it first.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("flow_m3s__gte", 0)),
                                name="network_typedflow_not_negative",
                                violation_error_message="A typed daily flow is not negative.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Vertical",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        ("distance_m", models.FloatField(verbose_name="distance, m")),
                        ("depth_m", models.FloatField(verbose_name="depth, m")),
                        (
                            "measured_at",
                            models.DateTimeField(blank=True, null=True, verbose_name="time"),
                        ),
                        (
                            "angle_deg",
                            models.FloatField(default=0, verbose_name="angle of the flow, °"),
                        ),
                        (
                            "ice_underside_m",
                            models.FloatField(
                                blank=True,
                                null=True,
                                verbose_name="water surface to underside of ice, m",
                            ),
                        ),
                        (
                            "line_angle_deg",
                            models.FloatField(
                                blank=True, null=True, verbose_name="angle of the line, °"
                            ),
                        ),
                        (
                            "air_line_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="line above water, m"
                            ),
                        ),
                        (
                            "wet_line_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="line in water, m"
                            ),
                        ),
                        ("mean_velocity_ms", models.FloatField(editable=False, null=True)),
                        ("panel_flow_m3s", models.FloatField(editable=False, null=True)),
                        ("panel_share_percent", models.FloatField(editable=False, null=True)),
                        (
                            "channel",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="verticals",
                                to="network.channel",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "vertical",
                        "verbose_name_plural": "verticals",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("channel", "position"),
                                name="network_vertical_position_once",
                                violation_error_message="Two verticals stand on the same line.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("depth_m__gte", 0)),
                                name="network_vertical_depth_not_negative",
                                violation_error_message="A depth is not negative.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalVerticalPoint",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "fraction",
                            models.FloatField(
                                help_text="0 is the surface, 1 the bed.",
                                verbose_name="part of the depth from the surface",
                            ),
                        ),
                        (
                            "revolutions",
                            models.FloatField(blank=True, null=True, verbose_name="revolutions"),
                        ),
                        (
                            "seconds",
                            models.FloatField(blank=True, null=True, verbose_name="seconds"),
                        ),
                        (
                            "velocity_ms",
                            models.FloatField(blank=True, null=True, verbose_name="velocity, m/s"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "vertical",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.vertical",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical point",
                        "verbose_name_plural": "historical points",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="VerticalPoint",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("position", models.PositiveSmallIntegerField()),
                        (
                            "fraction",
                            models.FloatField(
                                help_text="0 is the surface, 1 the bed.",
                                verbose_name="part of the depth from the surface",
                            ),
                        ),
                        (
                            "revolutions",
                            models.FloatField(blank=True, null=True, verbose_name="revolutions"),
                        ),
                        (
                            "seconds",
                            models.FloatField(blank=True, null=True, verbose_name="seconds"),
                        ),
                        (
                            "velocity_ms",
                            models.FloatField(blank=True, null=True, verbose_name="velocity, m/s"),
                        ),
                        (
                            "vertical",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="points",
                                to="network.vertical",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "point",
                        "verbose_name_plural": "points",
                        "ordering": ["position"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("vertical", "position"),
                                name="network_verticalpoint_position_once",
                                violation_error_message="Two points stand on the same line.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("fraction__range", (0, 1))),
                                name="network_verticalpoint_in_depth",
                                violation_error_message="The part of the depth lies between 0 and 1.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("revolutions__gte", 0),
                                        ("seconds__gt", 0),
                                        ("velocity_ms__isnull", True),
                                    ),
                                    models.Q(
                                        ("revolutions__isnull", True),
                                        ("seconds__isnull", True),
                                        ("velocity_ms__isnull", False),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_verticalpoint_counted_or_given",
                                violation_error_message="A point has revolutions and seconds, or a velocity, not both.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="SpinTest",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("seconds", models.FloatField(verbose_name="seconds")),
                        ("is_good", models.BooleanField(default=True, verbose_name="good")),
                        (
                            "pair",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="spin_tests",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "spin test",
                        "verbose_name_plural": "spin tests",
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("seconds__gte", 0)),
                                name="network_spintest_seconds",
                                violation_error_message="A spin test lasts at least zero seconds.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="Photograph",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("form_id", models.UUIDField(default=uuid.uuid4, editable=False)),
                        (
                            "image",
                            models.ImageField(
                                max_length=200, upload_to="photographs/", verbose_name="photograph"
                            ),
                        ),
                        (
                            "caption",
                            models.CharField(blank=True, max_length=200, verbose_name="caption"),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="photographs",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "photograph",
                        "verbose_name_plural": "photographs",
                    },
                ),
                migrations.CreateModel(
                    name="HistoricalWorkLeft",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("text", models.CharField(max_length=300, verbose_name="work left")),
                        ("done_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "done_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical work left",
                        "verbose_name_plural": "historical work left",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalVisitReading",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("read_at", models.DateTimeField(verbose_name="time")),
                        (
                            "observation",
                            models.CharField(
                                choices=[("read", "read"), ("dry", "dry"), ("frozen", "frozen")],
                                default="read",
                                max_length=6,
                                verbose_name="observation",
                            ),
                        ),
                        (
                            "reading_m",
                            models.FloatField(blank=True, null=True, verbose_name="reading, m"),
                        ),
                        (
                            "wave_m",
                            models.FloatField(blank=True, null=True, verbose_name="± wave, m"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "other_gauge",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.othergauge",
                                verbose_name="other gauge",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.staffplate",
                                verbose_name="plate",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical gauge reading",
                        "verbose_name_plural": "historical gauge readings",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalSpinTest",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("seconds", models.FloatField(verbose_name="seconds")),
                        ("is_good", models.BooleanField(default=True, verbose_name="good")),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "pair",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical spin test",
                        "verbose_name_plural": "historical spin tests",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalRecorderCheck",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("checked_at", models.DateTimeField(verbose_name="time")),
                        (
                            "found_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="recorder as found, m"
                            ),
                        ),
                        (
                            "left_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="recorder as left, m"
                            ),
                        ),
                        (
                            "staff_stage_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage by the staff, m"
                            ),
                        ),
                        (
                            "wave_m",
                            models.FloatField(blank=True, null=True, verbose_name="± wave, m"),
                        ),
                        (
                            "clock_error_s",
                            models.IntegerField(
                                blank=True,
                                help_text="Above zero: the recorder is fast.",
                                null=True,
                                verbose_name="clock error, s",
                            ),
                        ),
                        (
                            "battery_v",
                            models.FloatField(blank=True, null=True, verbose_name="battery, V"),
                        ),
                        (
                            "gas_kpa",
                            models.FloatField(
                                blank=True, null=True, verbose_name="gas pressure, kPa"
                            ),
                        ),
                        ("was_purged", models.BooleanField(default=False, verbose_name="purged")),
                        (
                            "was_downloaded",
                            models.BooleanField(default=False, verbose_name="download taken"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "series",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.series",
                                verbose_name="series",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical recorder check",
                        "verbose_name_plural": "historical recorder checks",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalPhotograph",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        ("form_id", models.UUIDField(default=uuid.uuid4, editable=False)),
                        ("image", models.TextField(max_length=200, verbose_name="photograph")),
                        (
                            "caption",
                            models.CharField(blank=True, max_length=200, verbose_name="caption"),
                        ),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical photograph",
                        "verbose_name_plural": "historical photographs",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="HistoricalGauging",
                    fields=[
                        (
                            "id",
                            models.BigIntegerField(
                                auto_created=True, blank=True, db_index=True, verbose_name="ID"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("version", models.PositiveIntegerField(default=1, editable=False)),
                        (
                            "form_id",
                            models.UUIDField(db_index=True, default=uuid.uuid4, editable=False),
                        ),
                        ("started_at", models.DateTimeField(verbose_name="started")),
                        ("ended_at", models.DateTimeField(verbose_name="ended")),
                        (
                            "way",
                            models.CharField(
                                choices=[
                                    ("wading", "wading"),
                                    ("bridge", "bridge"),
                                    ("cableway", "cableway"),
                                    ("boat", "boat"),
                                    ("ice", "ice"),
                                    ("bank", "from the bank"),
                                ],
                                default="wading",
                                max_length=10,
                                verbose_name="how",
                            ),
                        ),
                        (
                            "method",
                            models.CharField(
                                choices=[
                                    ("meter", "velocity-area with a current meter"),
                                    ("acoustic", "moving-boat acoustic"),
                                    ("float", "floats"),
                                    ("dilution", "dilution"),
                                    ("volume", "volumetric"),
                                    ("weir", "weir"),
                                ],
                                default="meter",
                                max_length=10,
                                verbose_name="method",
                            ),
                        ),
                        (
                            "sounding",
                            models.CharField(
                                choices=[
                                    ("rod", "rod"),
                                    ("line", "weight on a line"),
                                    ("acoustic", "echo sounder"),
                                ],
                                default="rod",
                                max_length=10,
                                verbose_name="sounding",
                            ),
                        ),
                        (
                            "spin_test_seconds",
                            models.FloatField(blank=True, null=True, verbose_name="spin test, s"),
                        ),
                        (
                            "stage_start_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage at the start, m"
                            ),
                        ),
                        (
                            "stage_end_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="stage at the end, m"
                            ),
                        ),
                        ("remarks", models.TextField(blank=True, verbose_name="remarks")),
                        (
                            "stated_discharge_m3s",
                            models.FloatField(
                                blank=True, null=True, verbose_name="discharge stated, m³/s"
                            ),
                        ),
                        (
                            "stated_u95_percent",
                            models.FloatField(blank=True, null=True, verbose_name="U₉₅ stated, %"),
                        ),
                        (
                            "state",
                            models.CharField(
                                choices=[
                                    ("draft", "draft"),
                                    ("signed", "signed"),
                                    ("checked", "checked"),
                                ],
                                default="draft",
                                editable=False,
                                max_length=8,
                            ),
                        ),
                        ("signed_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        ("checked_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "discharge_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="discharge, m³/s"
                            ),
                        ),
                        (
                            "mid_section_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mid-section, m³/s"
                            ),
                        ),
                        (
                            "mean_section_m3s",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean-section, m³/s"
                            ),
                        ),
                        (
                            "area_m2",
                            models.FloatField(editable=False, null=True, verbose_name="area, m²"),
                        ),
                        (
                            "width_m",
                            models.FloatField(editable=False, null=True, verbose_name="width, m"),
                        ),
                        (
                            "mean_velocity_ms",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean velocity, m/s"
                            ),
                        ),
                        (
                            "greatest_depth_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="greatest depth, m"
                            ),
                        ),
                        (
                            "hydraulic_radius_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="hydraulic radius, m"
                            ),
                        ),
                        (
                            "froude",
                            models.FloatField(
                                editable=False, null=True, verbose_name="Froude number"
                            ),
                        ),
                        (
                            "u95_percent",
                            models.FloatField(editable=False, null=True, verbose_name="U₉₅, %"),
                        ),
                        (
                            "signed_stage_m",
                            models.FloatField(
                                editable=False, null=True, verbose_name="mean stage at signing, m"
                            ),
                        ),
                        ("signed_deviation_percent", models.FloatField(editable=False, null=True)),
                        ("signed_shift_m", models.FloatField(editable=False, null=True)),
                        ("history_id", models.AutoField(primary_key=True, serialize=False)),
                        ("history_date", models.DateTimeField(db_index=True)),
                        ("history_change_reason", models.CharField(max_length=100, null=True)),
                        (
                            "history_type",
                            models.CharField(
                                choices=[("+", "Created"), ("~", "Changed"), ("-", "Deleted")],
                                max_length=1,
                            ),
                        ),
                        (
                            "act",
                            models.ForeignKey(
                                default=network.models.acts.current_act_id,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to="network.act",
                            ),
                        ),
                        (
                            "calibration",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.calibration",
                            ),
                        ),
                        (
                            "checked_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "history_user",
                            models.ForeignKey(
                                null=True,
                                on_delete=django.db.models.deletion.SET_NULL,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "signed_by",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "instrument",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.instrument",
                                verbose_name="other instrument",
                            ),
                        ),
                        (
                            "pair",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.meterpair",
                                verbose_name="current meter",
                            ),
                        ),
                        (
                            "station",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.station",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                blank=True,
                                db_constraint=False,
                                null=True,
                                on_delete=django.db.models.deletion.DO_NOTHING,
                                related_name="+",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "historical gauging",
                        "verbose_name_plural": "historical gaugings",
                        "ordering": ("-history_date", "-history_id"),
                        "get_latest_by": ("history_date", "history_id"),
                    },
                    bases=(simple_history.models.HistoricalChanges, models.Model),
                ),
                migrations.CreateModel(
                    name="VisitReading",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("read_at", models.DateTimeField(verbose_name="time")),
                        (
                            "observation",
                            models.CharField(
                                choices=[("read", "read"), ("dry", "dry"), ("frozen", "frozen")],
                                default="read",
                                max_length=6,
                                verbose_name="observation",
                            ),
                        ),
                        (
                            "reading_m",
                            models.FloatField(blank=True, null=True, verbose_name="reading, m"),
                        ),
                        (
                            "wave_m",
                            models.FloatField(blank=True, null=True, verbose_name="± wave, m"),
                        ),
                        (
                            "other_gauge",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.othergauge",
                                verbose_name="other gauge",
                            ),
                        ),
                        (
                            "plate",
                            models.ForeignKey(
                                blank=True,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                to="network.staffplate",
                                verbose_name="plate",
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="readings",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "gauge reading",
                        "verbose_name_plural": "gauge readings",
                        "ordering": ["read_at", "pk"],
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("other_gauge__isnull", True), ("plate__isnull", False)
                                    ),
                                    models.Q(
                                        ("other_gauge__isnull", False), ("plate__isnull", True)
                                    ),
                                    _connector="OR",
                                ),
                                name="network_visitreading_one_gauge",
                                violation_error_message="A reading names one plate or one other gauge.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(("observation", "read"), ("reading_m__isnull", False)),
                                    models.Q(
                                        models.Q(("observation", "read"), _negated=True),
                                        ("reading_m__isnull", True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_visitreading_value_when_read",
                                violation_error_message="A reading has a value; dry or frozen has none.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    ("wave_m__isnull", True), ("wave_m__gte", 0), _connector="OR"
                                ),
                                name="network_visitreading_wave",
                                violation_error_message="The wave is not negative.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="WorkingRules",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "level_closure_mm",
                            models.FloatField(
                                default=0.9, verbose_name="closure of levels per √set-up, mm"
                            ),
                        ),
                        (
                            "level_closure_cap_mm",
                            models.FloatField(
                                default=4.6, verbose_name="largest closure of levels, mm"
                            ),
                        ),
                        (
                            "level_tolerance_mm",
                            models.FloatField(
                                default=3, verbose_name="smallest error of a plate that counts, mm"
                            ),
                        ),
                        (
                            "peg_test_limit_mm",
                            models.FloatField(
                                default=2.5, verbose_name="collimation error, mm in 50 m"
                            ),
                        ),
                        (
                            "plates_agree_mm",
                            models.FloatField(
                                default=10, verbose_name="two plates read together agree within, mm"
                            ),
                        ),
                        (
                            "plate_overlap_m",
                            models.FloatField(
                                default=0.1, verbose_name="overlap of neighbouring plates, m"
                            ),
                        ),
                        (
                            "correction_tolerance_mm",
                            models.FloatField(
                                default=5,
                                verbose_name="smallest recorder error that is corrected, mm",
                            ),
                        ),
                        (
                            "calibration_months",
                            models.PositiveSmallIntegerField(
                                default=12, verbose_name="calibration, months"
                            ),
                        ),
                        (
                            "calibration_hours",
                            models.PositiveSmallIntegerField(
                                default=300, verbose_name="calibration, hours of use"
                            ),
                        ),
                        (
                            "calibration_change_percent",
                            models.FloatField(
                                default=2,
                                verbose_name="change between calibrations that calls for a look, %",
                            ),
                        ),
                        (
                            "visit_days",
                            models.PositiveSmallIntegerField(
                                default=42, verbose_name="routine visit, days"
                            ),
                        ),
                        (
                            "level_check_months",
                            models.PositiveSmallIntegerField(
                                default=36, verbose_name="level check, months"
                            ),
                        ),
                        (
                            "gaugings_per_year",
                            models.PositiveSmallIntegerField(
                                default=6, verbose_name="gaugings a year"
                            ),
                        ),
                        (
                            "inspection_months",
                            models.PositiveSmallIntegerField(
                                default=12, verbose_name="safety inspection, months"
                            ),
                        ),
                        (
                            "silence_days",
                            models.PositiveSmallIntegerField(
                                default=45, verbose_name="no data since, days"
                            ),
                        ),
                        (
                            "review_days",
                            models.PositiveSmallIntegerField(
                                default=90, verbose_name="record unreviewed, days"
                            ),
                        ),
                        (
                            "check_days",
                            models.PositiveSmallIntegerField(
                                default=14, verbose_name="visit or gauging unchecked, days"
                            ),
                        ),
                        (
                            "doubt_count",
                            models.PositiveSmallIntegerField(
                                default=3,
                                verbose_name="gaugings in a row on one side that put a rating in doubt",
                            ),
                        ),
                        (
                            "one_point_depth_m",
                            models.FloatField(
                                default=0.5, verbose_name="one point suffices up to a depth of, m"
                            ),
                        ),
                        (
                            "two_point_depth_m",
                            models.FloatField(
                                default=0.8, verbose_name="two points wanted from a depth of, m"
                            ),
                        ),
                        (
                            "surface_factor",
                            models.FloatField(
                                default=0.86, verbose_name="surface velocity to mean velocity"
                            ),
                        ),
                        (
                            "systematic_percent",
                            models.FloatField(
                                default=1.0, verbose_name="systematic standard uncertainty, %"
                            ),
                        ),
                        (
                            "wading_product_m2s",
                            models.FloatField(
                                default=0.9, verbose_name="wading below depth × velocity of, m²/s"
                            ),
                        ),
                        (
                            "weigh_bands_by_time",
                            models.BooleanField(
                                default=False,
                                verbose_name="gaugings wanted where water stands most of the time, not where most volume passes",
                            ),
                        ),
                        (
                            "stage_uncertainty_mm",
                            models.FloatField(
                                default=5, verbose_name="standard uncertainty of stage, mm"
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "working rules",
                        "verbose_name_plural": "working rules",
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(("pk", 1)),
                                name="network_workingrules_only_one",
                                violation_error_message="An installation has one set of working rules.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="WorkLeft",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("text", models.CharField(max_length=300, verbose_name="work left")),
                        ("done_at", models.DateTimeField(blank=True, editable=False, null=True)),
                        (
                            "done_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                            ),
                        ),
                        (
                            "visit",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="work_left",
                                to="network.visit",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "work left",
                        "verbose_name_plural": "work left",
                    },
                ),
                migrations.CreateModel(
                    name="BenchmarkElevation",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        (
                            "withdrawn_at",
                            models.DateTimeField(
                                blank=True, editable=False, null=True, verbose_name="withdrawn at"
                            ),
                        ),
                        (
                            "withdrawn_reason",
                            models.TextField(
                                blank=True, editable=False, verbose_name="reason of withdrawal"
                            ),
                        ),
                        (
                            "recorded_at",
                            models.DateTimeField(editable=False, verbose_name="recorded at"),
                        ),
                        ("effective_from", models.DateTimeField(verbose_name="in force from")),
                        ("reason", models.TextField(blank=True, verbose_name="reason")),
                        (
                            "elevation_m",
                            models.FloatField(
                                blank=True, null=True, verbose_name="elevation above the datum, m"
                            ),
                        ),
                        (
                            "benchmark",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="elevations",
                                to="network.benchmark",
                            ),
                        ),
                        (
                            "recorded_by",
                            models.ForeignKey(
                                editable=False,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="recorded by",
                            ),
                        ),
                        (
                            "withdrawn_by",
                            models.ForeignKey(
                                blank=True,
                                editable=False,
                                null=True,
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="+",
                                to=settings.AUTH_USER_MODEL,
                                verbose_name="withdrawn by",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "benchmark elevation",
                        "verbose_name_plural": "benchmark elevations",
                        "ordering": ["effective_from"],
                        "abstract": False,
                        "constraints": [
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(
                                        ("withdrawn_at__isnull", True),
                                        ("withdrawn_by__isnull", True),
                                        ("withdrawn_reason", ""),
                                    ),
                                    models.Q(
                                        ("withdrawn_at__isnull", False),
                                        ("withdrawn_by__isnull", False),
                                        models.Q(("withdrawn_reason", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_benchmarkelevation_withdrawal_whole",
                                violation_error_message="A withdrawal needs its instant, its author and a reason.",
                            ),
                            models.UniqueConstraint(
                                condition=models.Q(("withdrawn_at__isnull", True)),
                                fields=("benchmark", "effective_from"),
                                name="network_benchmarkelevation_start_once",
                                violation_error_message="Another row already starts at this instant; withdraw it first.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="CalibrationPiece",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("lowest_n", models.FloatField(default=0, verbose_name="from n, rev/s")),
                        (
                            "highest_n",
                            models.FloatField(blank=True, null=True, verbose_name="to n, rev/s"),
                        ),
                        ("a_ms", models.FloatField(verbose_name="a, m/s")),
                        ("b_m", models.FloatField(verbose_name="b, m")),
                        (
                            "calibration",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="pieces",
                                to="network.calibration",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "piece",
                        "verbose_name_plural": "pieces",
                        "ordering": ["lowest_n"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("calibration", "lowest_n"),
                                name="network_calibrationpiece_start_once",
                                violation_error_message="Two pieces start at the same n.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("b_m__gt", 0)),
                                name="network_calibrationpiece_rises",
                                violation_error_message="The velocity rises with n: b is above zero.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="CurveBand",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("stage_m", models.FloatField(verbose_name="stage, m")),
                        (
                            "u95_percent",
                            models.FloatField(verbose_name="U₉₅ of the mean relation, %"),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="band",
                                to="network.curve",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "point of the band",
                        "verbose_name_plural": "points of the band",
                        "ordering": ["stage_m"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("curve", "stage_m"),
                                name="network_curveband_stage_once",
                                violation_error_message="A stage stands once in a band.",
                            )
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="CurvePoint",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("stage_m", models.FloatField(verbose_name="stage, m")),
                        ("flow_m3s", models.FloatField(verbose_name="flow, m³/s")),
                        (
                            "curve",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="points",
                                to="network.curve",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "point of the table",
                        "verbose_name_plural": "points of the table",
                        "ordering": ["stage_m"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("curve", "stage_m"),
                                name="network_curvepoint_stage_once",
                                violation_error_message="A stage stands once in a table.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("flow_m3s__gte", 0)),
                                name="network_curvepoint_not_negative",
                                violation_error_message="A flow in a table is not negative.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="CurveSegment",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("lower_stage_m", models.FloatField(verbose_name="from stage, m")),
                        ("c", models.FloatField(verbose_name="C")),
                        ("h0_m", models.FloatField(verbose_name="h₀, m")),
                        ("b", models.FloatField(verbose_name="b")),
                        (
                            "curve",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="segments",
                                to="network.curve",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "segment",
                        "verbose_name_plural": "segments",
                        "ordering": ["lower_stage_m"],
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("curve", "lower_stage_m"),
                                name="network_curvesegment_start_once",
                                violation_error_message="Two segments start at the same stage.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(("b__gt", 0), ("c__gt", 0)),
                                name="network_curvesegment_rises",
                                violation_error_message="C and b are above zero.",
                            ),
                        ],
                    },
                ),
                migrations.CreateModel(
                    name="CurveGauging",
                    fields=[
                        (
                            "id",
                            models.BigAutoField(
                                auto_created=True,
                                primary_key=True,
                                serialize=False,
                                verbose_name="ID",
                            ),
                        ),
                        ("is_used", models.BooleanField(default=True, verbose_name="used")),
                        (
                            "left_out_because",
                            models.CharField(
                                blank=True, max_length=200, verbose_name="left out because"
                            ),
                        ),
                        (
                            "deviation_percent",
                            models.FloatField(blank=True, null=True, verbose_name="deviation, %"),
                        ),
                        (
                            "curve",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.CASCADE,
                                related_name="gaugings",
                                to="network.curve",
                            ),
                        ),
                        (
                            "gauging",
                            models.ForeignKey(
                                on_delete=django.db.models.deletion.PROTECT,
                                related_name="curves",
                                to="network.gauging",
                            ),
                        ),
                    ],
                    options={
                        "verbose_name": "gauging of a rating",
                        "verbose_name_plural": "gaugings of a rating",
                        "constraints": [
                            models.UniqueConstraint(
                                fields=("curve", "gauging"),
                                name="network_curvegauging_once",
                                violation_error_message="A gauging stands once in a rating version.",
                            ),
                            models.CheckConstraint(
                                condition=models.Q(
                                    models.Q(("is_used", True), ("left_out_because", "")),
                                    models.Q(
                                        ("is_used", False),
                                        models.Q(("left_out_because", ""), _negated=True),
                                    ),
                                    _connector="OR",
                                ),
                                name="network_curvegauging_reason_when_left_out",
                                violation_error_message="A gauging is left out with a reason.",
                            ),
                        ],
                    },
                ),
            ]
        )
    ]
