"""Integrates bodies under the Sun and the planets with SciPy's DOP853 at a relative tolerance of 1e-13: python3 scipy_planets.py REQUEST.json
The request holds mu, gravitation (one a planet), planets (rows of day and 24 coordinates, au) and bodies ({state, days}); the answer
their states after those days."""
import json
import sys

import numpy as np
from scipy.integrate import solve_ivp
from scipy.interpolate import make_interp_spline

with open(sys.argv[1], encoding='utf8') as file:
    request = json.load(file)
table = np.array(request['planets'])
places_at = make_interp_spline(table[:, 0], table[:, 1:], k=7)
mu = request['mu']
gravitation = np.array(request['gravitation'])[:, None]


def rate(day, state):
    place = state[:3]
    planets = places_at(day).reshape(-1, 3)
    apart = planets - place
    pull = gravitation * (apart / np.linalg.norm(apart, axis=1)[:, None] ** 3 - planets / np.linalg.norm(planets, axis=1)[:, None] ** 3)
    return np.concatenate([state[3:], -mu * place / np.linalg.norm(place) ** 3 + pull.sum(0)])


def moved(body):
    return solve_ivp(rate, (0, body['days']), body['state'], method='DOP853', rtol=1e-13, atol=1e-16).y[:, -1].tolist()


print(json.dumps([moved(body) for body in request['bodies']]))
