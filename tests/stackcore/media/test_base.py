"""What every medium shares."""

import numpy as np

from stackcore.media.base import FrequencyRange


def test_a_range_holds_both_of_its_ends() -> None:
    """A range is closed: its ends are inside and what lies beyond them is not."""
    frequency = np.array([7.9e9, 8e9, 10e9, 12.4e9, 12.5e9])
    assert FrequencyRange(8e9, 12.4e9).contains(frequency).tolist() == [False, True, True, True, False]
