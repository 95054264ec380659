"""Fourths and fences against published examples and against the quantile rules that are not the same thing."""

import numpy as np
import pytest

from analysis.batch.fences import fences, is_above, is_below
from analysis.batch.fourths import fourths


@pytest.mark.parametrize("n", range(1, 401))
def test_fourths_of_one_to_n_follow_the_closed_form(n):
    # Base R's documentation example of boxplot.stats: hinges of 1..n are floor((n+3)/2)/2 and floor((3n+2)/2)/2.
    batch = fourths(np.arange(1, n + 1))
    assert batch.lower == ((n + 3) // 2) / 2
    assert batch.upper == ((3 * n + 2) // 2) / 2
    assert batch.median == (n + 1) / 2


def test_the_1986_example_has_one_value_outside():
    # Hoaglin, Iglewicz & Tukey (1986), JASA 81:991-999, abstract: -5 -2 0 1 8.
    values = np.array([-5.0, -2, 0, 1, 8])
    batch = fourths(values)
    own = fences(batch, 5)
    assert (batch.lower, batch.upper) == (-2, 1)
    assert (own.lower, own.upper) == (-6.5, 5.5)
    assert values[is_above(values, own.upper)].tolist() == [8]
    assert not is_below(values, own.lower).any()


def test_eight_values_worked_by_hand_in_a_public_test_file():
    values = np.array([2.0, 4, 4, 5, 7, 9, 12, 25])
    batch = fourths(values)
    own = fences(batch, 8)
    assert (batch.lower, batch.upper) == (4, 10.5)
    assert own == (-5.75, 20.25, -15.5, 30)
    assert is_above(values, own.upper).sum() == 1
    assert not is_above(values, own.outer_upper).any()


def test_hinges_fifteen_and_twenty_three_make_the_textbook_steps():
    # Online Statistics Education, box plot chapter: hinges 15 and 23, step 12, inner fences 3 and 35, outer 47.
    values = np.array([15.0, 15, 15, 19, 23, 23, 23, 19])
    batch = fourths(values)
    assert (batch.lower, batch.upper) == (15, 23)
    own = fences(batch, 8)
    assert (own.lower, own.upper, own.outer_upper) == (3, 35, 47)


NIST_7_1_6 = """
 30 171 184 201 212 250 265 270 272 289 305 306 322 322 336 346 351 370 390 404 409 411 436 437 439 441 444
448 451 453 470 480 482 487 494 495 499 503 514 521 522 527 548 550 559 560 570 572 574 578 585 592 592 607
616 618 621 629 637 638 640 656 668 707 709 719 737 739 752 758 766 792 792 794 802 818 830 832 843 858 860
869 918 925 953 991 1000 1005 1068 1441
"""


def test_the_engineering_handbook_data_show_hinges_are_not_its_quartiles():
    # NIST/SEMATECH e-Handbook, sect. 7.1.6: its quartiles (position p(n+1)) are 429.75 and 742.25; Tukey's hinges
    # of the same data, by R's fivenum, are 436 and 739.
    values = np.array(NIST_7_1_6.split(), dtype=float)
    assert len(values) == 90
    handbook = np.quantile(values, [0.25, 0.75], method="weibull")
    assert handbook.tolist() == [429.75, 742.25]
    batch = fourths(values)
    own = fences(batch, 90)
    assert batch == (436, 559.5, 739)
    assert own == (-18.5, 1193.5, -473, 1648)
    assert values[is_above(values, own.upper)].tolist() == [1441]
    assert not is_above(values, own.outer_upper).any()


@pytest.mark.parametrize(
    ("values", "hinge_fences", "numpy_fences"),
    [
        ([20, 22, 24, 25, 27, 28, 30, 47], (14, 38), (16, 36)),
        ([20, 22, 24, 25, 27, 28, 30, 31, 48], (15, 39), (15, 39)),
        ([20, 22, 24, 25, 26, 27, 28, 30, 31, 45], (15, 39), (16.375, 37.375)),
        ([20, 22, 23, 24, 25, 26, 27, 28, 30, 31, 45], (15.25, 37.25), (15.25, 37.25)),
    ],
    ids=["8 days", "9 days", "10 days", "11 days"],
)
def test_numpy_quartiles_give_other_fences_and_ours_do_not_follow_them(values, hinge_fences, numpy_fences):
    batch = fourths(values)
    own = fences(batch, len(values))
    low, high = np.quantile(values, [0.25, 0.75])
    assert (own.lower, own.upper) == hinge_fences
    assert (low - 1.5 * (high - low), high + 1.5 * (high - low)) == numpy_fences


def test_a_day_of_38_is_inside_by_hinges_and_outside_by_numpy():
    own = fences(fourths([20, 22, 24, 25, 26, 27, 28, 30, 31, 45]), 10)
    assert not is_above(np.array([38.0]), own.upper).any()
    assert np.quantile([20, 22, 24, 25, 26, 27, 28, 30, 31, 45], 0.75) + 1.5 * 5.25 < 38


@pytest.mark.parametrize(
    "method", ["linear", "weibull", "hazen", "averaged_inverted_cdf", "inverted_cdf", "midpoint"]
)
def test_no_single_numpy_rule_gives_the_fourths_of_every_length(method):
    rng = np.random.default_rng(7)
    agrees = []
    for n in range(5, 61):
        values = rng.normal(size=n)
        batch = fourths(values)
        agrees.append(np.allclose([batch.lower, batch.upper], np.quantile(values, [0.25, 0.75], method=method)))
    assert not all(agrees)


def test_fourths_agree_with_the_median_of_each_half_with_the_middle_in_both():
    rng = np.random.default_rng(11)
    for n in range(1, 80):
        ordered = np.sort(rng.integers(0, 30, n)).astype(float)
        half = (n + 1) // 2
        batch = fourths(rng.permutation(ordered))
        assert batch == (np.median(ordered[:half]), np.median(ordered), np.median(ordered[n - half :]))


def test_a_value_on_the_fence_is_inside_whatever_the_rounding_does():
    # 0.1 + 0.2 is not 0.3 in binary: fences made of tenths must not flag a day that stands on them.
    values = np.array([0.1, 0.2, 0.2, 0.3, 0.3, 0.4, 0.4, 0.5]) * 1.1
    batch = fourths(values)
    own = fences(batch, 8)
    on_upper = np.array([round(own.upper, 10)])
    assert not is_above(on_upper, own.upper).any()
    assert not is_below(np.array([round(own.lower, 10)]), own.lower).any()
    assert is_above(np.array([own.upper + 0.001]), own.upper).all()
