"""What earlier years did, by month and by calendar date."""

from datetime import date

import numpy as np

from network.numerics.years.earlier_years import day_bands, over_years
from network.numerics.years.water_year import WaterYear, period_figures


def test_a_date_is_compared_with_the_same_date_of_earlier_years_only():
    days = np.arange(np.datetime64("2015-01-01"), np.datetime64("2021-01-01"))
    values = np.asarray(days.astype("datetime64[Y]").astype(int) + 1970, dtype=float)
    bands = day_bands(days, values, year=2020, calendar=WaterYear())
    assert len(bands.days) == 366
    new_year = 0
    leap_day = int(np.flatnonzero(bands.days == np.datetime64("2020-02-29"))[0])
    # 2015 … 2019 on 1 January; 29 February only in 2016
    assert bands.count[new_year] == 5
    assert bands.minimum[new_year] == 2015
    assert bands.lower_quartile[new_year] == 2016
    assert bands.median[new_year] == bands.mean[new_year] == 2017
    assert bands.upper_quartile[new_year] == 2018
    assert bands.maximum[new_year] == 2019
    assert bands.count[leap_day] == 1
    assert bands.mean[leap_day] == 2016


def test_dates_without_an_earlier_value_have_a_count_of_zero_and_no_figures():
    days = np.arange(np.datetime64("2019-10-01"), np.datetime64("2019-10-11"))
    october = WaterYear(10)
    bands = day_bands(days, np.arange(10.0), year=2020, calendar=october)
    assert bands.days[0] == np.datetime64("2020-10-01")
    assert bands.count[:11].tolist() == [1] * 10 + [0]
    assert np.isnan(bands.median[10])
    assert day_bands(days, np.arange(10.0), year=2019, calendar=october).count.sum() == 0


def test_a_month_over_the_years_keeps_the_first_of_equal_extremes():
    years = [
        period_figures(np.array([2.0, 4.0]), first_day=date(2018, 3, 1)),
        period_figures(np.array([np.nan, 9.0]), first_day=date(2019, 3, 1)),
        period_figures(np.array([8.0, 2.0]), first_day=date(2020, 3, 1)),
    ]
    earlier = over_years(years)
    assert (earlier.years_with_mean, earlier.mean) == (2, 4.0)
    assert (earlier.minimum, earlier.minimum_day) == (2.0, date(2018, 3, 1))
    assert (earlier.maximum, earlier.maximum_day) == (9.0, date(2019, 3, 2))


def test_no_earlier_year_says_nothing():
    earlier = over_years([])
    assert (earlier.years_with_mean, earlier.mean, earlier.maximum_day) == (0, None, None)
