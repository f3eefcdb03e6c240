import json, numpy as np
from scipy.signal import butter, sosfiltfilt, find_peaks, peak_prominences
rng=np.random.default_rng(20261201)
x=np.round(np.cumsum(rng.normal(size=160))*0.3+np.sin(np.arange(160)*0.4),6)
out={"samples":x.tolist(),"cases":[]}
for order,kind,fc,fs in [(4,'low',3,50),(2,'low',1,50),(3,'low',5,100),(2,'high',0.5,50),(3,'high',2,25)]:
    y=sosfiltfilt(butter(order,fc,kind,fs=fs,output='sos'),x)
    out["cases"].append(dict(order=order,kind=kind,cutoffHz=fc,sampleRateHz=fs,expected=y.tolist()))
p,_=find_peaks(x); out["peaks"]=p.tolist(); out["prominences"]=peak_prominences(x,p)[0].tolist()
json.dump(out,open('scipy-filters.json','w'))
