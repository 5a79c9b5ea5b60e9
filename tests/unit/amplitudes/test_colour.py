"""Generators of SU(3) and colour matrices of flows against their algebra."""

from __future__ import annotations

from itertools import permutations

import numpy as np
import pytest

from barnwright.amplitudes import GENERATORS, SINGLET, colour_matrix, quark_line


def test_generators() -> None:
    """Hermitian, without trace, Tr T^a T^b = δ^ab/2, Σ T^a T^a = 4/3; nobody can write into them."""
    np.testing.assert_array_equal(GENERATORS, np.conj(np.swapaxes(GENERATORS, 1, 2)))
    np.testing.assert_allclose(np.einsum("aii->a", GENERATORS), 0, atol=1e-16)
    np.testing.assert_allclose(np.einsum("aij,bji->ab", GENERATORS, GENERATORS), np.eye(8) / 2, atol=1e-16)
    np.testing.assert_allclose(np.einsum("aij,ajk->ik", GENERATORS, GENERATORS), 4 / 3 * np.eye(3), atol=1e-15)
    assert not GENERATORS.flags.writeable


def test_completeness() -> None:
    """Σ T^a_ij T^a_kl = (δ_il δ_jk − δ_ij δ_kl/3)/2."""
    one = np.eye(3)
    expected = (np.einsum("il,jk->ijkl", one, one) - np.einsum("ij,kl->ijkl", one, one) / 3) / 2
    np.testing.assert_allclose(np.einsum("aij,akl->ijkl", GENERATORS, GENERATORS), expected, atol=1e-15)


def test_structure_constants() -> None:
    """f^abc from [T^a, T^b] = i f^abc T^c: f^123 = 1, f^147 = ½, f^458 = √3/2 as Gell-Mann has them."""
    commutator = np.einsum("aij,bjk->abik", GENERATORS, GENERATORS)
    commutator = commutator - np.swapaxes(commutator, 0, 1)
    constants = np.real(-2j * np.einsum("abij,cji->abc", commutator, GENERATORS))
    assert (constants[0, 1, 2], constants[0, 3, 6]) == pytest.approx((1, 0.5))
    assert constants[3, 4, 7] == pytest.approx(np.sqrt(3) / 2)
    np.testing.assert_allclose(np.einsum("acd,bcd->ab", constants, constants), 3 * np.eye(8), atol=1e-14)


def test_quark_pair() -> None:
    """δ_ij has Σ = 3, T^a_ij has Tr T^a T^a = 4."""
    assert quark_line(0) == SINGLET == ((3.0,),)
    assert np.array(quark_line(1)) == pytest.approx(np.array([[4.0]]))


def test_two_gluons() -> None:
    """Tr T^aT^bT^bT^a = 3 C_F² = 16/3 and Tr T^aT^bT^aT^b = C_F(C_F − 3/2)·3 = −2/3."""
    assert np.array(quark_line(2)) == pytest.approx(np.array([[16, -2], [-2, 16]]) / 3)


def test_three_gluons() -> None:
    """The six orders: the diagonal is 3C_F³ = 64/9, and each entry depends on the relative order only."""
    matrix = np.array(quark_line(3))
    orders = list(permutations(range(3)))
    assert np.diag(matrix) == pytest.approx(64 / 9)
    np.testing.assert_allclose(matrix, matrix.T, atol=1e-14)
    chain = np.einsum("aij,bjk,ckl->abcil", GENERATORS, GENERATORS, GENERATORS)
    for row, first in enumerate(orders):
        one = np.moveaxis(chain, range(3), first)
        for column, second in enumerate(orders):
            other = np.moveaxis(chain, range(3), second)
            assert matrix[row, column] == pytest.approx(np.real(np.sum(one * np.conj(other))), abs=1e-13)


def test_four_quarks() -> None:
    """δ_il δ_kj and δ_ij δ_kl: ((9, 3), (3, 9)); entries are plain real numbers."""
    one = np.eye(3)
    matrix = colour_matrix(np.einsum("ij,kl->ijkl", one, one), np.einsum("il,kj->ijkl", one, one))
    assert matrix == ((9.0, 3.0), (3.0, 9.0))
    assert all(isinstance(entry, float) for row in matrix for entry in row)


def test_complex_entries_stay() -> None:
    """A flow with a phase gives the complex product, conjugated across the diagonal."""
    matrix = colour_matrix(np.eye(3), 1j * np.eye(3))
    assert matrix == ((3.0, -3j), (3j, 3.0))


def test_refusals() -> None:
    """Flows have one shape; there are 0 to 3 gluons."""
    with pytest.raises(ValueError, match=r"flows: got tensors of the shapes \[\(3, 3\), \(8, 3, 3\)\], expected one"):
        colour_matrix(np.eye(3), GENERATORS)
    for number in (-1, 4):
        with pytest.raises(ValueError, match=f"gluons: got {number}, expected a number from 0 to 3"):
            quark_line(number)
