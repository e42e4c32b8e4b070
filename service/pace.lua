-- May this request go on? Every allowance it draws on is asked, and charged only when all of them have room.
--
-- KEYS[1]  whose credential this is, noted when it last served; an empty name: no credential came
-- ARGV[1]  who asks when that is not known (the address)
-- ARGV[2]  requests a minute of somebody known, ARGV[3] of an address; 0: no limit
-- ARGV[4..] further allowances, three words each: name, "who" or "address" (whose it is), requests a minute
--
-- Returns {known (0 or 1), refused (place of the first without room, or 0), wait in ms,
--          then for each allowance: name, quota, left, ms until it is whole again}.
--
-- Each allowance is one number, the time at which it will be whole again (the generic cell rate algorithm): so many
-- requests at once, and after that one each time a share of the minute has passed. All of it is one step for the
-- server, so that requests at the same time cannot both take the last place.
local WINDOW = 60000
local PREFIX = 'tarebook:pace:'

local clock = redis.call('TIME')
local now = tonumber(clock[1]) * 1000 + math.floor(tonumber(clock[2]) / 1000)

local who = false
if KEYS[1] ~= '' then
  who = redis.call('GET', KEYS[1])
end
local address = ARGV[1]

local wanted = {}
local function want(name, whose, quota)
  quota = tonumber(quota)
  if quota > 0 then
    wanted[#wanted + 1] = {name = name, key = PREFIX .. name .. ':' .. whose, quota = quota}
  end
end
if who then
  want('known', who, ARGV[2])
else
  want('stranger', address, ARGV[3])
end
for i = 4, #ARGV, 3 do
  want(ARGV[i], (ARGV[i + 1] == 'who' and who) or address, ARGV[i + 2])
end

local refused, wait = 0, 0
for place, one in ipairs(wanted) do
  local share = WINDOW / one.quota
  local whole = math.max(tonumber(redis.call('GET', one.key) or now), now)
  one.after = whole + share
  local beyond = one.after - now - WINDOW
  if beyond > 0.001 then
    if refused == 0 then
      refused = place
    end
    wait = math.max(wait, beyond)
  end
  one.whole = whole
  one.share = share
end

local answer = {who and 1 or 0, refused, math.ceil(wait)}
for _, one in ipairs(wanted) do
  local reached = one.whole
  if refused == 0 then
    reached = one.after
    redis.call('SET', one.key, string.format('%.3f', reached), 'PX', math.ceil(reached - now) + 1)
  end
  answer[#answer + 1] = one.name
  answer[#answer + 1] = one.quota
  answer[#answer + 1] = math.max(0, math.floor((WINDOW - (reached - now)) / one.share + 0.001))
  answer[#answer + 1] = math.ceil(reached - now)
end
return answer
