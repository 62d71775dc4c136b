% Savitzky-Golay with ends, FIR design and application, Welch density, cross-spectrum, coherence,
% Burg models and analytic signals by Octave and its signal package.
%
% Run with octave --no-gui --no-init-file numeric-octave.m in this folder; writes numeric-octave.json.
pkg load signal

% Integers of a linear congruential generator (Park & Miller 1988), as numbers in -1..1 of 6 decimals.
function x = lehmer (count, state)
  x = zeros (1, count);
  for i = 1:count
    state = mod (16807 * state, 2147483647);
    x(i) = round (1e6 * (2 * state / 2147483647 - 1)) / 1e6;
  end
end

function one = smoothed (x, window, order, derivative)
  one = struct ("window", window, "order", order, "derivative", derivative, "x", x,
                "y", sgolayfilt (x, order, window, derivative, 1));
end

function one = burged (x, order)
  [a, v, k] = arburg (x, order);
  one = struct ("order", order, "x", x, "coefficients", real (a(2:end)), "variance", v,
                "reflections", real (k(:).'));
end

function one = analytic (x)
  z = hilbert (x);
  one = struct ("x", x, "re", real (z), "im", imag (z));
end

drift = round (1e6 * cumsum (lehmer (80, 11))) / 1e6;
x = lehmer (600, 1);
shared = lehmer (600, 2);
y = round (1e6 * (0.6 * x + 0.4 * [0 0 0 x(1:end-3)] + 0.5 * shared)) / 1e6;
t = (0:299) / 4;
wave = round (1e6 * (100 * cos (2*pi*0.05*t + 0.3) .* (1 + 0.3 * cos (2*pi*0.004*t)))) / 1e6;
ar = filter (1, [1 -1.8 0.95], lehmer (960, 5));
ar = round (1e6 * ar) / 1e6;

% fir1 samples the response in frequency; the windowed sinc itself is wanted here.
[n, wn, beta] = kaiserord ([40 45], [1 0], [10^-3 10^-3], 250);
n += mod (n, 2);
taps = kaiser (n + 1, beta).' .* sinc (wn * (-n/2:n/2));
taps /= sum (taps);
filtered = conv (x, taps, "same");

window = hann (128, "periodic");
cross = pwelch (x, y, window, 0.75, 128, 4, "onesided", "cross", "none");
coherence = pwelch (x, y, window, 0.75, 128, 4, "onesided", "coher", "none");
density = pwelch (x, window, 0.75, 128, 4, "onesided", "none");

result = struct ();
result.made_with = struct ("octave", version (), "signal", pkg ("describe", "signal"){1}.version);
result.savgol = {smoothed(drift, 11, 2, 0), smoothed(drift, 25, 4, 0), smoothed(drift, 15, 3, 1)};
result.fir = struct ("x", x, "taps", taps, "y", filtered);
result.pair = struct ("x", x, "y", y, "cross_re", real (cross(:).'), "cross_im", imag (cross(:).'),
                      "coherence", coherence(:).', "density", density(:).');
result.burg = {burged(x(1:60), 4), burged(ar, 2), burged(ar, 40), burged(drift, 12)};
result.hilbert = {analytic(wave), analytic(wave(1:299)), analytic(x(1:63))};
file = fopen ("numeric-octave.json", "w");
fprintf (file, "%s\n", jsonencode (result));
fclose (file);
