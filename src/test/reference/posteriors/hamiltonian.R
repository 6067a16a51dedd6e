# Hamiltonian Monte Carlo on the C++ model (gradients by automatic differentiation): Neal 2011, in Handbook of Markov
# Chain Monte Carlo, ch. 5. Four chains from draws of the prior of theta; during the warm-up the step is tuned to an
# acceptance of 0.85 by dual averaging (Hoffman & Gelman 2014, J. Mach. Learn. Res. 15: 1593-1623) and the mass matrix
# is the inverse covariance of ever longer windows; both are fixed afterwards.
#   Rscript hamiltonian.R CASE [ITERATIONS]
source("tables.R"); source("joint.R"); source("diagnose.R")

TRAJECTORY <- 1.6   # time of a whitened trajectory, a quarter of a normal's period; varied by a third
WINDOWS <- c(150, 250, 500, 1000)

chain <- function(model, from, scale, iterations) {
  energy <- function(z) tryCatch(model$fn(z), warning = function(w) NaN)
  step <- 0.1
  z <- from
  value <- energy(z)
  root <- t(chol(scale))
  kept <- matrix(NA, iterations, length(z))
  accepted <- 0
  one <- function() {
    steps <- max(1, min(60, ceiling(TRAJECTORY * runif(1, 0.67, 1.33) / step)))
    p <- rnorm(length(z))
    before <- value + sum(p^2) / 2
    new <- z
    p <- p - step / 2 * drop(crossprod(root, drop(model$gr(new))))
    for (s in seq_len(steps)) {
      new <- new + step * drop(root %*% p)
      g <- drop(crossprod(root, drop(model$gr(new))))
      if (!all(is.finite(g))) return(0)
      p <- p - (if (s < steps) step else step / 2) * g
    }
    after <- energy(new)
    chance <- min(1, exp(before - after - sum(p^2) / 2))
    if (!is.finite(chance)) return(0)
    if (runif(1) < chance) {
      z <<- new
      value <<- after
    }
    chance
  }
  for (w in seq_along(WINDOWS)) {
    centre <- log(10 * step)
    sum_of_errors <- 0
    log_average <- 0
    window <- matrix(NA, WINDOWS[w], length(z))
    for (i in seq_len(WINDOWS[w])) {
      sum_of_errors <- sum_of_errors + 0.85 - one()
      log_step <- centre - sqrt(i) / 0.05 * sum_of_errors / (i + 10)
      weight <- i^-0.75
      log_average <- weight * log_step + (1 - weight) * log_average
      step <- exp(log_step)
      window[i, ] <- z
    }
    step <- exp(log_average)
    late <- window[-seq_len(WINDOWS[w] %/% 4), ]
    share <- nrow(late) / (nrow(late) + 5 + 2 * length(z))
    scale <- share * cov(late) + (1 - share) * diag(diag(scale), length(z))
    if (w < length(WINDOWS)) root <- t(chol(scale))
  }
  for (i in seq_len(iterations)) {
    accepted <- accepted + one()
    kept[i, ] <- z
  }
  list(kept = kept, accepted = accepted / iterations, step = step)
}

case <- commandArgs(TRUE)[1]
iterations <- if (length(commandArgs(TRUE)) > 1) as.integer(commandArgs(TRUE)[2]) else 5000L
compile_model()
d <- model_data(case)
model <- joint_model(d, FALSE)
names_of <- names(model$par)
began <- proc.time()[["elapsed"]]
set.seed(20261)
free <- which(d$outer[2, ] > 0)
chains <- lapply(1:4, function(k) {
  from <- model$par
  from[names_of == "u"] <- rnorm(length(free))
  # the states' mode for this theta
  states <- names_of != "u"
  inner <- nlminb(from[states],
    function(s) { z <- from; z[states] <- s; v <- model$fn(z); if (is.finite(v)) v else 1e10 },
    function(s) { z <- from; z[states] <- s; model$gr(z)[states] }, control = list(iter.max = 300, eval.max = 400))
  from[states] <- inner$par
  scale <- diag(ifelse(states, 0.01, 0.1))
  result <- chain(model, from, scale, iterations)
  cat(case, "chain", k, "acceptance", round(result$accepted, 3), "step", signif(result$step, 3),
    "seconds", round(proc.time()[["elapsed"]] - began), "\n")
  result$kept
})
column <- function(i) sapply(chains, function(m) m[, i])
u <- lapply(seq_along(free), function(k) column(which(names_of == "u")[k]))
theta <- lapply(seq_len(ncol(d$outer)), function(k) {
  own <- match(k, free)
  d$outer[1, k] + if (is.na(own)) 0 * u[[1]] else d$outer[2, k] * u[[own]]
})
names(theta) <- colnames(d$outer)
x <- which(names_of == "x")
l <- which(names_of == "l")
rows <- summarise(quantities(d, theta, column(x[d$T]), column(x[d$T + 1]), column(l[d$T])), "hamiltonian")
store(case, rows)
print(rows[c("quantity", "year", "q05", "q50", "q95", "mcse50", "ess", "rhat")], row.names = FALSE)
cat("seconds", round(proc.time()[["elapsed"]] - began), "\n")
