"""Times SciPy: one JSON question a line, one line with the processor seconds of a call in return."""

import json
import sys
import time

import numpy
from scipy import linalg, signal


def step_responses(A, B, C, step, samples):
    times = step * numpy.arange(samples)
    for column in range(B.shape[1]):
        system = signal.StateSpace(A, B[:, [column]], C, numpy.zeros((C.shape[0], 1)))
        signal.lsim(system, numpy.ones(samples), times, interp=False)


def ensemble(C, K, plants, step, samples):
    m, n = K.shape
    for a, b in plants:
        A, B = numpy.reshape(a, (n, n)), numpy.reshape(b, (n, m))
        block = numpy.zeros((n + m, n + m))
        block[:n, :n], block[:n, n:] = A - B @ K, B
        numpy.linalg.eigvals(block[:n, :n])
        held = linalg.expm(block * step)
        F, G = held[:n, :n], held[:n, n:]
        values = numpy.empty((samples, C.shape[0], m))
        state = numpy.zeros((n, m))
        for k in range(samples):
            values[k] = C @ state
            state = F @ state + G


def frequency_response(A, B, C, frequencies):
    identity = numpy.eye(A.shape[0])
    for w in frequencies:
        C @ numpy.linalg.solve(1j * w * identity - A, B)


ROUTINES = {
    "continuous_riccati": lambda A, B, Q, R, S: linalg.solve_continuous_are(A, B, Q, R, s=S),
    "discrete_riccati": lambda A, B, Q, R, S: linalg.solve_discrete_are(A, B, Q, R, s=S),
    "lyapunov": lambda A, Q: linalg.solve_continuous_lyapunov(A, -Q),
    "eigenvalues": lambda A: numpy.linalg.eigvals(A),
    "exponential": lambda A: linalg.expm(A),
    "placement": lambda A, B, poles: signal.place_poles(A, B, poles),
    "step_responses": step_responses,
    "ensemble": ensemble,
    "frequency_response": frequency_response,
}

prepared = {}
for line in sys.stdin:
    message = json.loads(line)
    name = message["name"]
    if "question" in message:
        ask = message["question"].pop("ask")
        values = {key: numpy.array(value) if key.isupper() else value for key, value in message["question"].items()}
        if "poles" in values:
            values["poles"] = numpy.array([complex(re, im) for re, im in values["poles"]])
        prepared[name] = (ROUTINES[ask], values)
    routine, values = prepared[name]
    calls = 0
    end = time.perf_counter() + message["budget"]
    began = time.process_time()
    while calls == 0 or time.perf_counter() < end:
        routine(**values)
        calls += 1
    print(json.dumps((time.process_time() - began) / calls), flush=True)
