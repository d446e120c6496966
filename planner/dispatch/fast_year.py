"""The fast engine: a year's commitment and a proven bound, where the shape is known."""

from collections.abc import Callable
from dataclasses import dataclass
import time

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.fast_bound import Year, sweep_back
from planner.dispatch.fast_peaks import Month, MonthBound, MonthSearch, months_of
from planner.dispatch.fast_prepare import prepare
from planner.dispatch.fast_shape import state_steps, why_unknown
from planner.dispatch.fast_walk import walk
from planner.dispatch.months import borders
from planner.dispatch.window import Window, whole_year


def solve_window(window, gap_frac):
    t0=time.perf_counter()
    steps, layout = state_steps(window)
    year = prepare(window, steps)
    t1=time.perf_counter()
    months = months_of(window, year, borders(window))
    states=len(year.running)
    w=0.0; L0=0.0
    if window.store:
        w,L0=border(year)
    t2=time.perf_counter()
    after=np.tile(year.capacity*np.maximum(0.,w-year.grid[-1]),(states,1))
    size=abs(rough(year))
    out=[]
    for m in reversed(months):
        s=MonthSearch(year,m,after)
        b=s.bound(0.4*gap_frac*size*m.steps/window.steps)
        out.append((s,b)); after=b.before
    t3=time.perf_counter()
    up=int(year.running.sum())
    F=after
    v=[-np.interp(w,year.grid[0],F[x]) for x in (up-1,states-1)]
    lb=min(v)+window.fixed_cost
    x=(up-1,states-1)[int(np.argmin(v))]; L=L0
    on=np.zeros(window.steps,dtype=np.int64); pr=np.zeros(window.steps)
    for (s,b) in reversed(out):
        m=s.month
        if len(m.rates):
            tot=np.array(s.worth)[:,x]+np.array(s.peaks)@m.rates; b.peaks=s.peaks[int(tot.argmin())]
        s.price(b.peaks)
        kv=np.zeros((m.steps,states,year.grid.shape[1]))
        sweep_back(year,m.first,s.stage,s.alive,s.after,kv)
        x,L=walk(year,m.first,s.stage,s.alive,kv,x,L,on[m.first:m.first+m.steps],pr[m.first:m.first+m.steps])
        if x<0: raise RuntimeError('dead')
    t4=time.perf_counter()
    return dict(lb=lb,on=on.astype(bool),sweeps=[b.sweeps for s,b in out],open=[round(b.open_cost,1) for s,b in out],t=dict(prep=t1-t0,border=t2-t1,bound=t3-t2,fwd=t4-t3),L=L,L0=L0,w=w,size=size,months=months,out=out,year=year)

def rough(year):
    ok=year.curves.count>0
    return float(np.where(ok,year.free.max(axis=2),np.inf).min(axis=1).sum())

def border(year):
    n=len(year.day); k=min(240,n); nv=year.grid.shape[1]
    from planner.dispatch.fast_peaks import NO_VALUES
    from planner.dispatch.fast_bound import price_steps
    def run(first,steps,after,keep):
        st=np.zeros((steps,2,nv)); al=np.zeros((steps,2),dtype=np.int64)
        price_steps(year,first,np.full(steps,np.inf),np.zeros((steps,2)),st,al)
        kv=np.zeros((steps,len(year.running),nv)) if keep else NO_VALUES
        return sweep_back(year,first,st,al,after,kv),st,al,kv
    w=float(np.median(year.grid[-1]))
    F,_,_,_=run(0,k,np.tile(year.capacity*np.maximum(0.,w-year.grid[year.day[k-1]]*year.scale[k-1]),(len(year.running),1)),False)
    G=np.array([np.interp(year.grid[-1],year.grid[0],f) for f in F])
    below=np.maximum(year.grid[0][0]-year.grid[-1],0)
    H,st,al,kv=run(n-k,k,G,True)
    on=np.zeros(k,dtype=np.int64); pr=np.zeros(k)
    x,L=walk(year,n-k,st,al,kv,int(year.running.sum())-1,0.5*year.capacity,on,pr)
    return float(pr[-1]),L
