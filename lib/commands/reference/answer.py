"""Answers questions about matrices, one JSON document in, one out, every number with all its digits."""

import json
import sys

import numpy
import scipy
from scipy import linalg, signal


def riccati(solve):
    def answer(A, B, Q, R, S):
        X = solve(A, B, Q, R, s=S)
        if solve is linalg.solve_continuous_are:
            K = linalg.solve(R, B.T @ X + S.T, assume_a="pos")
        else:
            K = linalg.solve(R + B.T @ X @ B, B.T @ X @ A + S.T, assume_a="pos")
        return {"X": X.tolist(), "K": K.tolist()}

    return answer


def eigenvalues(A):
    values, left, right = linalg.eig(A, left=True, right=True)
    conditions = 1 / abs(numpy.einsum("ij,ij->j", left.conj(), right))
    return {"values": [[v.real, v.imag] for v in values], "conditions": conditions.tolist()}


def placement(A, B, poles):
    wanted = numpy.array([complex(re, im) for re, im in poles])
    K = signal.place_poles(A, B, wanted).gain_matrix
    vectors = numpy.linalg.eig(A - B @ K)[1]
    return {"K": K.tolist(), "conditioning": float(numpy.linalg.cond(vectors))}


def exponential(A):
    return {"value": linalg.expm(A).tolist(), "condition": float(linalg.expm_cond(A))}


def hold(A, B, period):
    n, m = B.shape
    held = signal.cont2discrete((A, B, numpy.eye(n), numpy.zeros((n, m))), period)
    block = numpy.zeros((n + m, n + m))
    block[:n, :n], block[:n, n:] = A, B
    return {"A": held[0].tolist(), "B": held[1].tolist(), "condition": float(linalg.expm_cond(block * period))}


def step_response(A, B, C, horizon, moments, stride):
    times = numpy.linspace(0, horizon, moments)
    system = signal.StateSpace(A, B, C, numpy.zeros((C.shape[0], 1)))
    values = signal.lsim(system, numpy.ones(moments), times, interp=False)[1].reshape(moments, -1)
    return values[::stride].T.tolist()


def frequency_response(A, B, C, frequencies):
    values, scales = [], []
    for w in frequencies:
        shifted = 1j * w * numpy.eye(A.shape[0]) - A
        values.append(C @ linalg.solve(shifted, B))
        reach = linalg.norm(linalg.inv(shifted))
        scales.append(float(reach * reach * linalg.norm(shifted) * linalg.norm(B) * linalg.norm(C)))
    return {"values": [[[[x.real, x.imag] for x in row] for row in value] for value in values], "scales": scales}


ROUTINES = {
    "continuous_riccati": riccati(linalg.solve_continuous_are),
    "discrete_riccati": riccati(linalg.solve_discrete_are),
    "continuous_lyapunov": lambda A, Q: linalg.solve_continuous_lyapunov(A, -Q).tolist(),
    "discrete_lyapunov": lambda A, Q: linalg.solve_discrete_lyapunov(A, Q).tolist(),
    "eigenvalues": eigenvalues,
    "singular_values": lambda A: linalg.svdvals(A).tolist(),
    "placement": placement,
    "exponential": exponential,
    "hold": hold,
    "step_response": step_response,
    "frequency_response": frequency_response,
}


def answer(ask, **arguments):
    matrices = {name: numpy.array(value) if name.isupper() else value for name, value in arguments.items()}
    return ROUTINES[ask](**matrices)


if __name__ == "__main__":
    answers = [answer(**question) for question in json.load(sys.stdin)]
    json.dump({"version": scipy.__version__, "answers": answers}, sys.stdout)
