package org.merewarden.account;

import com.github.benmanes.caffeine.cache.Caffeine;
import com.github.benmanes.caffeine.cache.LoadingCache;
import io.github.bucket4j.Bucket;
import jakarta.servlet.FilterChain;
import jakarta.servlet.ServletException;
import jakarta.servlet.http.HttpServletRequest;
import jakarta.servlet.http.HttpServletResponse;
import java.io.IOException;
import java.time.Duration;
import java.util.Locale;
import org.jspecify.annotations.Nullable;
import org.springframework.context.event.EventListener;
import org.springframework.http.HttpMethod;
import org.springframework.http.HttpStatus;
import org.springframework.security.authentication.event.AuthenticationSuccessEvent;
import org.springframework.security.web.authentication.WebAuthenticationDetails;
import org.springframework.security.web.servlet.util.matcher.PathPatternRequestMatcher;
import org.springframework.security.web.util.matcher.RequestMatcher;
import org.springframework.stereotype.Component;
import org.springframework.web.filter.OncePerRequestFilter;

/**
 * Slows down guessing of passwords: so many tries per name from one address, more per address over all names. Counted per
 * name <em>and</em> address, since by name alone anybody could lock out an approver. A sign-in that succeeds clears the
 * count of its name. Each process counts for itself.
 */
@Component
class SignInGuard extends OncePerRequestFilter {
    static final int TRIES_PER_NAME = 6;
    static final int TRIES_PER_ADDRESS = 60;
    private static final RequestMatcher SIGN_IN =
            PathPatternRequestMatcher.withDefaults().matcher(HttpMethod.POST, "/sign-in");
    private static final Duration PERIOD = Duration.ofMinutes(10);

    private final LoadingCache<String, Bucket> names = buckets(TRIES_PER_NAME);
    private final LoadingCache<String, Bucket> addresses = buckets(TRIES_PER_ADDRESS);

    private static LoadingCache<String, Bucket> buckets(int tries) {
        return Caffeine.newBuilder()
                .maximumSize(50_000)
                .expireAfterAccess(PERIOD)
                .build(key -> Bucket.builder()
                        .addLimit(limit -> limit.capacity(tries).refillGreedy(tries, PERIOD))
                        .build());
    }

    /** Names are kept in lower case without spaces around them; people type them as they like. */
    static String name(@Nullable String typed) {
        return typed == null ? "" : typed.strip().toLowerCase(Locale.ROOT);
    }

    @Override
    protected boolean shouldNotFilter(HttpServletRequest request) {
        return !SIGN_IN.matches(request);
    }

    @Override
    protected void doFilterInternal(HttpServletRequest request, HttpServletResponse response, FilterChain chain)
            throws ServletException, IOException {
        String address = request.getRemoteAddr();
        String name = key(name(request.getParameter("username")), address);
        if (names.get(name).tryConsume(1) && addresses.get(address).tryConsume(1)) {
            chain.doFilter(request, response);
        } else {
            response.setStatus(HttpStatus.TOO_MANY_REQUESTS.value());
            response.setHeader("Retry-After", Long.toString(PERIOD.toSeconds() / TRIES_PER_NAME));
            request.getRequestDispatcher("/sign-in/later").forward(request, response);
        }
    }

    @EventListener
    void cleared(AuthenticationSuccessEvent event) {
        if (event.getAuthentication().getDetails() instanceof WebAuthenticationDetails details) {
            String address = details.getRemoteAddress();
            names.invalidate(key(name(event.getAuthentication().getName()), address));
            addresses.get(address).addTokens(1);
        }
    }

    private static String key(String name, String address) {
        return name + " " + address;
    }
}
