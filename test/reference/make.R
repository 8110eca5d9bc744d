# Fits the samples of fits.json with survreg of R's package survival and prints them as JSON:
#   Rscript make.R > made-by-r.json      (from this folder; Debian: r-base-core, r-cran-survival)
# The gamma distribution is not among survreg's; make.py fits it. Compare with check.mjs.
suppressPackageStartupMessages(library(survival))

# JSON is nearly R: the pieces between quotes are translated, the quoted ones stay. No escaped quotes in our files.
read_json <- function(file) {
  pieces <- strsplit(paste(readLines(file), collapse = "\n"), '"', fixed = TRUE)[[1]]
  code <- seq(1, length(pieces), by = 2)
  for (pair in list(c("[", "list("), c("]", ")"), c("{", "list("), c("}", ")"), c(":", "="), c("null", "NULL")))
    pieces[code] <- gsub(pair[1], pair[2], pieces[code], fixed = TRUE)
  eval(parse(text = paste(pieces, collapse = '"')))
}

# One row a line of the data set: time, time2, event code of Surv(type = "interval") and weight.
rows_of <- function(set) {
  exact <- lapply(set$exact, function(r) c(r[[1]], r[[1]], 1, r[[2]]))
  alive <- lapply(set$surviving, function(r) c(r[[1]], r[[1]], 0, r[[2]]))
  between <- lapply(set$between, function(r)
    if (r[[1]] == 0) c(r[[2]], r[[2]], 2, r[[3]]) else c(r[[1]], r[[2]], 3, r[[3]]))
  rows <- as.data.frame(do.call(rbind, c(exact, alive, between)))
  setNames(rows, c("time", "time2", "code", "weight"))
}

# survreg's intercept and log scale, and the standard errors of our parameters by the delta method.
fit <- function(rows, family) {
  control <- survreg.control(rel.tolerance = 1e-14, toler.chol = 1e-14, maxiter = 200)
  model <- survreg(Surv(time, time2, code, type = "interval") ~ 1, data = rows, weights = weight,
                   dist = family, control = control)
  mu <- unname(coef(model))
  sigma <- model$scale
  errors <- sqrt(diag(vcov(model)))
  answer <- switch(family,
    exponential = list(c(scale = exp(mu)), c(scale = exp(mu) * errors[[1]])),
    weibull = list(c(shape = 1 / sigma, scale = exp(mu)), c(shape = errors[[2]] / sigma, scale = exp(mu) * errors[[1]])),
    list(c(location = mu, scale = sigma), c(location = errors[[1]], scale = errors[[2]] * sigma)))
  list(parameters = answer[[1]], standardErrors = answer[[2]], logLikelihood = model$loglik[[2]])
}

number <- function(x) format(x, digits = 17, scientific = NA)
object <- function(x) paste0("{", paste0('"', names(x), '": ', x, collapse = ", "), "}")

tool <- sprintf("%s, survival %s", R.version.string, packageVersion("survival"))
answers <- character()
for (set in read_json("fits.json")$dataSets) {
  for (family in c("exponential", "weibull", "lognormal", "loglogistic")) {
    f <- fit(rows_of(set), family)
    answers[[paste(set$name, family)]] <- object(c(
      parameters = object(sapply(f$parameters, number)),
      standardErrors = object(sapply(f$standardErrors, number)),
      logLikelihood = number(f$logLikelihood)))
  }
}
cat(sprintf('{"tool": "%s",\n "fits": {\n', tool))
cat(paste0('  "', names(answers), '": ', answers, collapse = ",\n"), "\n }\n}\n")
