"""What every test shares: files of their own, nothing sent to the network."""

import pytest
from hypothesis import settings as hypothesis_settings

# A busy machine makes no test wrong: examples are judged by their result, not by their time.
hypothesis_settings.register_profile("unhurried", deadline=None)
hypothesis_settings.load_profile("unhurried")


@pytest.fixture(autouse=True)
def own_files(settings, tmp_path):
    """Keep what a test stores away from the installation's own data."""
    settings.DATA_DIR = tmp_path
    settings.MEDIA_ROOT = tmp_path / "media"
    settings.EDITIONS_ROOT = tmp_path / "editions"
