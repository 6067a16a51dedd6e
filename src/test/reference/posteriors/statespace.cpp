// Joint negative log density of the state-space surplus-production model, written from its equations:
//   x_1 ~ N(ln beta, s), l_1 ~ N(ln F_1, s), l_{t+1} ~ N(l_t, sigma_F), ln q_j ~ N
//   x+ = ln(e^x + S/K),  x_{t+1} ~ N(ln b(1; x+, F), sqrt(sigma_p^2 + v_t)),  t = 1..T (x_{T+1} is the coming season)
//   ln b(s) = -log1p( expm1(-n ln b0) e^(-a s) + n F (1 - e^(-a s))/a )/n,  a = r - n F;  n -> 0: (u0 + F/r) e^(-r s) - F/r
//   n = 1: C = (F K/r) ln(1 + r b0 (e^a - 1)/a); else Gauss-Legendre, 20 points
//   ln catch ~ N(ln C, sd), ln I ~ N(ln q + ln B(s), sqrt(sigma_j^2 + cv^2)), ln B_obs ~ N(ln B(s), cv),
//   ln E ~ N(l - ln q, sigma_j)
// theta = (ln MSY, ln FMSY, ln sigma_p, ln sigma_F, ln n, ln sigma_j ...), theta_k = m_k + s_k u_k, u_k ~ N(0, 1).
#include <TMB.hpp>

template <class Type>
Type gain(Type z) {  // (1 - e^-z)/z
  Type h = z / Type(2);
  return exp(-h) * (exp(h) - exp(-h)) / z;
}

template <class Type>
Type log_biomass(Type x, Type r, Type n, Type F, Type s, int fox) {
  if (fox) return (x + F / r) * exp(-r * s) - F / r;
  Type a = r - n * F;
  return -log(Type(1) + (exp(-n * x) - Type(1)) * exp(-a * s) + n * F * s * gain(a * s)) / n;
}

template <class Type>
Type objective_function<Type>::operator()() {
  DATA_INTEGER(fox);
  DATA_INTEGER(schaefer);
  DATA_IVECTOR(closed);
  DATA_VECTOR(stocked);
  DATA_IVECTOR(fished);
  DATA_VECTOR(log_catch);
  DATA_VECTOR(catch_sd);
  DATA_IVECTOR(index_t);
  DATA_IVECTOR(index_series);
  DATA_VECTOR(index_time);
  DATA_VECTOR(index_log);
  DATA_VECTOR(index_cv);
  DATA_IVECTOR(mass_t);
  DATA_VECTOR(mass_time);
  DATA_VECTOR(mass_log);
  DATA_VECTOR(mass_cv);
  DATA_IVECTOR(effort_t);
  DATA_IVECTOR(effort_series);
  DATA_VECTOR(effort_log);
  DATA_VECTOR(q_mean);
  DATA_VECTOR(q_sd);
  DATA_VECTOR(start);
  DATA_VECTOR(first_rate);
  DATA_VECTOR(middle);
  DATA_VECTOR(spread);
  DATA_VECTOR(node);
  DATA_VECTOR(node_weight);
  PARAMETER_VECTOR(u);
  PARAMETER_VECTOR(x);
  PARAMETER_VECTOR(l);
  PARAMETER_VECTOR(log_q);

  Type nll = 0;
  for (int k = 0; k < u.size(); k++)  // a spread of 0 fixes a parameter: it has no prior
    if (spread(k) > 0) nll -= dnorm(u(k), Type(0), Type(1), true);
  vector<Type> theta = middle + spread * u;
  Type n = exp(theta(4));
  Type r = exp(theta(1)) * (fox ? Type(1) : Type(1) + n);
  Type logK = theta(0) - theta(1) + (fox ? Type(1) : log(Type(1) + n) / n);
  Type process = exp(theta(2));
  int T = l.size();

  nll -= dnorm(x(0), start(0), start(1), true);
  nll -= dnorm(l(0), first_rate(0), first_rate(1), true);
  for (int j = 0; j < log_q.size(); j++) nll -= dnorm(log_q(j), q_mean(j), q_sd(j), true);

  vector<Type> plus(T), F(T);
  for (int t = 0; t < T; t++) {
    Type s = stocked(t) * exp(-logK);
    plus(t) = stocked(t) > 0 ? log(exp(x(t)) + s) : x(t);
    F(t) = closed(t) ? Type(0) : exp(l(t));
    Type widened = Type(0.3) * s / (s + Type(0.5));
    Type sd = sqrt(process * process + widened * widened);
    nll -= dnorm(x(t + 1), log_biomass(plus(t), r, n, F(t), Type(1), fox), sd, true);
    if (t > 0) nll -= dnorm(l(t), l(t - 1), exp(theta(3)), true);
  }

  for (int i = 0; i < fished.size(); i++) {
    int t = fished(i) - 1;
    Type logC;
    if (schaefer) {
      Type a = r - F(t);
      logC = l(t) + logK - log(r) + log(log(Type(1) + r * exp(plus(t)) * gain(-a)));
    } else {
      Type mean = 0;
      for (int k = 0; k < node.size(); k++)
        mean += node_weight(k) * exp(log_biomass(plus(t), r, n, F(t), node(k), fox));
      logC = l(t) + logK + log(mean);
    }
    nll -= dnorm(log_catch(i), logC, catch_sd(i), true);
  }
  for (int i = 0; i < index_t.size(); i++) {
    int t = index_t(i) - 1, j = index_series(i) - 1;
    Type logB = logK + (index_time(i) > 0 ? log_biomass(plus(t), r, n, F(t), index_time(i), fox) : plus(t));
    Type sd = sqrt(exp(Type(2) * theta(5 + j)) + index_cv(i) * index_cv(i));
    nll -= dnorm(index_log(i), log_q(j) + logB, sd, true);
  }
  for (int i = 0; i < mass_t.size(); i++) {
    int t = mass_t(i) - 1;
    Type logB = logK + (mass_time(i) > 0 ? log_biomass(plus(t), r, n, F(t), mass_time(i), fox) : plus(t));
    nll -= dnorm(mass_log(i), logB, mass_cv(i), true);
  }
  for (int i = 0; i < effort_t.size(); i++) {
    int t = effort_t(i) - 1, j = effort_series(i) - 1;
    if (!closed(t)) nll -= dnorm(effort_log(i), l(t) - log_q(j), exp(theta(5 + j)), true);
  }
  return nll;
}
